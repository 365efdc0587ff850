package equilibrium

import "math"

// quadratic solves, in a workspace of its own,
//
//	min ½ dᵀH d + gᵀd   under   a_i·(λ + d) = r_i  (the first few rows)
//	                            a_i·(λ + d) ≤ r_i  (the others)
//
// by the dual active-set method of Goldfarb and Idnani 1983, Math. Programming
// 27, 1: it starts from a working set whose multipliers are not negative (that of
// the last call, less what has gone negative), adds the most violated constraint
// and drops those that block; the dual objective rises at every step, so it
// cannot cycle. Rows that depend on each other (two forms of one solid) are
// exchanged, not added.
//
// A solid that holds nearly all of a metal leaves H with entries of 1e-25 beside a
// gradient of 1e-5, and H⁻¹g would drown the answer in rounding. So the gradient
// is taken with the multipliers of the last call put in (the shift), and only
// their change is solved for.
type quadratic struct {
	equalities int
	working    []int32   // constraints in the set, equalities first
	x          []float64 // multipliers by constraint
	shift      []float64 // part of x that is in the gradient already

	factor []float64 // Cholesky factor of the scaled H; its diagonal holds reciprocals
	scale  []float64
	base   []float64 // −L⁻¹S(g + Σ shift a)
	normal []float64 // L⁻¹ a_i for each of the working set, row by row
	schur  []float64
	r, u   []float64
	z, v   []float64
}

func (q *quadratic) init(n, constraints int) {
	f := func(n int) []float64 { return make([]float64, n) }
	most := n + 1
	q.working = make([]int32, 0, constraints+1)
	q.x, q.shift = f(constraints), f(constraints)
	q.factor, q.scale, q.base = f(n*n), f(n), f(n)
	q.normal, q.schur = f(most*n), f(most*most)
	q.r, q.u, q.z, q.v = f(most), f(most), f(n), f(n)
}

// forget empties the working set.
func (q *quadratic) forget(constraints int) {
	q.working = q.working[:0]
	for i := range q.x[:constraints] {
		q.x[i] = 0
	}
}

// solve returns false when equalities contradict each other.
func (q *quadratic) solve(n, constraints int, h, g, rows, rhs, lambda, d []float64) bool {
	// Scale H to a unit diagonal: amounts differ by many powers of ten.
	l := q.factor[:n*n]
	for i := 0; i < n; i++ {
		q.scale[i] = 1 / math.Sqrt(math.Max(h[i*n+i], 1e-280))
	}
	for i := 0; i < n; i++ {
		for j := 0; j <= i; j++ {
			l[i*n+j] = h[i*n+j] * q.scale[i] * q.scale[j]
		}
	}
	cholesky(l, n)
	q.working = mergeWorking(q.working, q.equalities, constraints, n)
	for i := range q.shift[:constraints] {
		q.shift[i] = 0
	}
	for _, w := range q.working {
		q.shift[w] = q.x[w]
	}
	for i := range q.x[:constraints] {
		q.x[i] = 0
	}
	q.shiftedBase(n, g, rows)
	base := q.base[:n]
	// Drop from the inherited set until no multiplier is negative.
	for {
		for k, w := range q.working {
			row := q.normal[k*n : k*n+n]
			copy(row, rows[int(w)*n:int(w)*n+n])
			q.halfSolve(n, row)
		}
		if bad := q.factorSchur(n); bad >= 0 {
			if bad < q.equalities {
				return false
			}
			q.drop(n, bad, g, rows)
			continue
		}
		m := len(q.working)
		for k, w := range q.working {
			a := rows[int(w)*n : int(w)*n+n]
			q.u[k] = dot(q.normal[k*n:k*n+n], base) - (rhs[w] - dot(a, lambda[:n]))
		}
		choleskySolve(q.schur[:m*m], m, q.u[:m])
		worst, at := 0.0, -1
		for k, w := range q.working {
			q.u[k] += q.shift[w]
			if k >= q.equalities && q.u[k] < worst {
				worst, at = q.u[k], k
			}
		}
		if at < 0 {
			for k, w := range q.working {
				q.x[w] = q.u[k]
			}
			break
		}
		q.drop(n, at, g, rows)
	}
	q.current(n, d)
	for pass := 0; pass < 40*(constraints+1); pass++ {
		worst, add := 0.0, -1
		at := q.v[:n]
		for k := range at {
			at[k] = lambda[k] + d[k]
		}
		for i := q.equalities; i < constraints; i++ {
			v := dot(rows[i*n:i*n+n], at) - rhs[i]
			if v > worst && v > 1e-11*(1+math.Abs(rhs[i])) && !q.inSet(i) {
				worst, add = v, i
			}
		}
		if add < 0 {
			q.polish(n, rows, rhs, lambda, d)
			return true
		}
		if !q.add(n, add, g, rows, rhs, lambda, d) {
			return false
		}
	}
	return true
}

// polish removes what rounding left of the residuals of the working set.
func (q *quadratic) polish(n int, rows, rhs, lambda, d []float64) {
	m := len(q.working)
	for pass := 0; pass < 3 && m > 0; pass++ {
		worst := 0.0
		for k, w := range q.working {
			v := -rhs[w]
			for i, c := range rows[int(w)*n : int(w)*n+n] {
				v += c * (lambda[i] + d[i])
			}
			q.u[k] = v
			worst = math.Max(worst, math.Abs(v)/(1+math.Abs(rhs[w])))
		}
		if worst < 1e-13 {
			return
		}
		choleskySolve(q.schur[:m*m], m, q.u[:m])
		v := q.v[:n]
		for i := range v {
			v[i] = 0
		}
		for k := range q.working {
			for i, a := range q.normal[k*n : k*n+n] {
				v[i] -= q.u[k] * a
			}
		}
		q.backSolve(n, v)
		for i := range v {
			d[i] += v[i]
		}
	}
}

// shiftedBase sets base from the gradient and the shifts.
func (q *quadratic) shiftedBase(n int, g, rows []float64) {
	base := q.base[:n]
	for i := range base {
		base[i] = -g[i]
	}
	for _, w := range q.working {
		if s := q.shift[w]; s != 0 {
			for k, a := range rows[int(w)*n : int(w)*n+n] {
				base[k] -= s * a
			}
		}
	}
	q.halfSolve(n, base)
}

// drop takes the k-th constraint out of the inherited set.
func (q *quadratic) drop(n, k int, g, rows []float64) {
	w := q.working[k]
	q.working = append(q.working[:k], q.working[k+1:]...)
	if q.shift[w] != 0 {
		q.shift[w] = 0
		q.shiftedBase(n, g, rows)
	}
}

// mergeWorking puts the equalities in front and keeps at most n constraints.
func mergeWorking(working []int32, equalities, constraints, n int) []int32 {
	kept := 0
	for _, w := range working {
		if int(w) >= equalities && int(w) < constraints && kept < n-equalities {
			working[kept] = w
			kept++
		}
	}
	working = working[:kept+equalities]
	copy(working[equalities:], working[:kept])
	for i := 0; i < equalities; i++ {
		working[i] = int32(i)
	}
	return working
}

func (q *quadratic) inSet(i int) bool {
	for _, w := range q.working {
		if int(w) == i {
			return true
		}
	}
	return false
}

// halfSolve turns v into L⁻¹ S v, S the scaling.
func (q *quadratic) halfSolve(n int, v []float64) {
	for i := range v {
		v[i] *= q.scale[i]
	}
	forward(q.factor, n, v)
}

// backSolve turns v into S L⁻ᵀ v.
func (q *quadratic) backSolve(n int, v []float64) {
	backward(q.factor, n, v)
	for i := range v {
		v[i] *= q.scale[i]
	}
}

// factorSchur forms and factors N H⁻¹ Nᵀ; it returns the place of a row that
// depends on those before it, or -1.
func (q *quadratic) factorSchur(n int) int {
	m := len(q.working)
	for i := 0; i < m; i++ {
		for j := 0; j <= i; j++ {
			q.schur[i*m+j] = dot(q.normal[i*n:i*n+n], q.normal[j*n:j*n+n])
		}
	}
	for i := 0; i < m; i++ {
		diagonal := q.schur[i*m+i]
		for j := 0; j < i; j++ {
			s := q.schur[i*m+j]
			for k := 0; k < j; k++ {
				s -= q.schur[i*m+k] * q.schur[j*m+k]
			}
			q.schur[i*m+j] = s * q.schur[j*m+j]
		}
		s := diagonal
		for k := 0; k < i; k++ {
			s -= q.schur[i*m+k] * q.schur[i*m+k]
		}
		if !(s > dependent*diagonal) {
			return i
		}
		q.schur[i*m+i] = 1 / math.Sqrt(s)
	}
	return -1
}

// current sets d from the multipliers: H d = −g − Σ x a, of which base has the
// shifts.
func (q *quadratic) current(n int, d []float64) {
	v := q.v[:n]
	copy(v, q.base[:n])
	for k, w := range q.working {
		x := q.x[w] - q.shift[w]
		row := q.normal[k*n : k*n+n]
		for i := range v {
			v[i] -= x * row[i]
		}
	}
	q.backSolve(n, v)
	copy(d[:n], v)
}

// add brings constraint i into the set, dropping those that block.
func (q *quadratic) add(n, i int, g, rows, rhs, lambda, d []float64) bool {
	a := rows[i*n : i*n+n]
	for {
		m := len(q.working)
		z := q.z[:n]
		copy(z, a)
		q.halfSolve(n, z)
		full := dot(z, z)
		for k := 0; k < m; k++ {
			q.r[k] = dot(q.normal[k*n:k*n+n], z)
		}
		choleskySolve(q.schur[:m*m], m, q.r[:m])
		for k := 0; k < m; k++ {
			row := q.normal[k*n : k*n+n]
			for j := range z {
				z[j] -= q.r[k] * row[j]
			}
		}
		rest := dot(z, z)
		violation := -rhs[i]
		for k, c := range a {
			violation += c * (lambda[k] + d[k])
		}
		toLimit := math.Inf(1)
		if rest > dependent*full && m < n {
			toLimit = violation / rest
		}
		toBlock, block := math.Inf(1), -1
		for k := q.equalities; k < m; k++ {
			if q.r[k] > 1e-12 {
				if t := q.x[q.working[k]] / q.r[k]; t < toBlock {
					toBlock, block = t, k
				}
			}
		}
		t := math.Min(toLimit, toBlock)
		if math.IsInf(t, 1) {
			return false // cannot hold together with the equalities
		}
		for k := 0; k < m; k++ {
			q.x[q.working[k]] -= t * q.r[k]
		}
		q.x[i] += t
		if toLimit <= toBlock {
			q.working = append(q.working, int32(i))
			row := q.normal[m*n : m*n+n]
			copy(row, a)
			q.halfSolve(n, row)
			if bad := q.factorSchur(n); bad >= 0 {
				q.working = q.working[:m]
				q.factorSchur(n)
				return true
			}
			q.current(n, d)
			return true
		}
		gone := q.working[block]
		q.x[gone] = 0
		copy(q.normal[block*n:], q.normal[(block+1)*n:m*n])
		q.drop(n, block, g, rows)
		q.factorSchur(n)
		// d with the multiplier that i has so far.
		v := q.v[:n]
		copy(v, a)
		q.halfSolve(n, v)
		x := q.x[i]
		for j := range v {
			v[j] = q.base[j] - x*v[j]
		}
		for k, w := range q.working {
			row := q.normal[k*n : k*n+n]
			change := q.x[w] - q.shift[w]
			for j := range v {
				v[j] -= change * row[j]
			}
		}
		q.backSolve(n, v)
		copy(d[:n], v)
	}
}

// cholesky factors the lower triangle of a in place; the diagonal of the factor
// holds reciprocals. A pivot that is lost to rounding is replaced by a small one,
// which shortens the step along that direction instead of failing.
func cholesky(a []float64, n int) {
	for i := 0; i < n; i++ {
		row := a[i*n : i*n+i+1]
		diagonal := row[i]
		s := diagonal
		for j := 0; j < i; j++ {
			other := a[j*n : j*n+j+1]
			v := row[j]
			for k, o := range other[:j] {
				v -= row[k] * o
			}
			v *= other[j]
			row[j] = v
			s -= v * v
		}
		if !(s > 1e-14*diagonal) {
			s = 1e-14*diagonal + 1e-300
		}
		row[i] = 1 / math.Sqrt(s)
	}
}

func choleskySolve(l []float64, n int, v []float64) {
	forward(l, n, v)
	backward(l, n, v)
}

// forward turns v into L⁻¹ v, backward into L⁻ᵀ v.
func forward(l []float64, n int, v []float64) {
	for i := 0; i < n; i++ {
		row := l[i*n : i*n+i+1]
		s := v[i]
		for j, a := range row[:i] {
			s -= a * v[j]
		}
		v[i] = s * row[i]
	}
}

func backward(l []float64, n int, v []float64) {
	for i := n - 1; i >= 0; i-- {
		row := l[i*n : i*n+i+1]
		s := v[i] * row[i]
		v[i] = s
		for j, a := range row[:i] {
			v[j] -= a * s
		}
	}
}

// dependent is the part of a row that must be new to count as independent of the
// rows in the set: exact dependence leaves about 1e-16 of rounding, while rows of
// a scarce component leave as little as 1e-12 and are independent.
const dependent = 1e-13
