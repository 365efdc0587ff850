package equilibrium

import "math"

// anderson speeds the fixed-point iteration y = g(y) of activity coefficients,
// ln a_w and ln W by mixing the last few iterates (Anderson 1965, J. ACM 12,
// 547; the least squares by normal equations, which are small and regularised).
type anderson struct {
	lnWater, lnMass float64

	y, f         []float64 // this iterate and its residual g(y) − y
	yLast, fLast []float64
	dy, df       [andersonDepth][]float64
	count, next  int
	have         bool
	gram         [andersonDepth][andersonDepth]float64 // Δf_i·Δf_j
	matrix       [andersonDepth * andersonDepth]float64
	theta        [andersonDepth]float64
	best         float64
}

const andersonDepth = 5

func (a *anderson) init(n int) {
	a.y, a.f, a.yLast, a.fLast = make([]float64, n), make([]float64, n), make([]float64, n), make([]float64, n)
	for i := range a.dy {
		a.dy[i], a.df[i] = make([]float64, n), make([]float64, n)
	}
}

func (a *anderson) reset() {
	a.count, a.next, a.have, a.best = 0, 0, false, math.Inf(1)
}

// residual stores the iterate and its image and returns the largest difference.
func (a *anderson) residual(gammas, image []float64, lnWater, lnMass float64) float64 {
	n := len(gammas)
	worst := 0.0
	for i, g := range gammas {
		d := image[i] - g
		a.y[i], a.f[i] = g, d
		if d < 0 {
			d = -d
		}
		if d > worst {
			worst = d
		}
	}
	a.y[n], a.f[n] = a.lnWater, lnWater-a.lnWater
	a.y[n+1], a.f[n+1] = a.lnMass, lnMass-a.lnMass
	worst = math.Max(worst, math.Max(math.Abs(a.f[n]), math.Abs(a.f[n+1])))
	if math.IsNaN(a.f[n]) || math.IsNaN(a.f[n+1]) {
		return math.NaN()
	}
	return worst
}

// advance moves gammas, lnWater and lnMass to the next iterate. With a damping it
// is that part of a plain step, slow and safe.
func (a *anderson) advance(gammas []float64, damping float64) {
	n := len(a.y)
	if damping > 0 {
		for i := range a.y {
			a.y[i] += damping * a.f[i]
		}
		a.put(gammas)
		return
	}
	if a.have {
		dy, df := a.dy[a.next], a.df[a.next]
		for i := 0; i < n; i++ {
			dy[i], df[i] = a.y[i]-a.yLast[i], a.f[i]-a.fLast[i]
		}
		if a.count < andersonDepth {
			a.count++
		}
		for j := 0; j < a.count; j++ {
			a.gram[a.next][j] = dot(df, a.df[j])
			a.gram[j][a.next] = a.gram[a.next][j]
		}
		a.next = (a.next + 1) % andersonDepth
	}
	copy(a.yLast, a.y)
	copy(a.fLast, a.f)
	a.have = true
	a.solveTheta()
	// the move into f, history by history
	for j := 0; j < a.count; j++ {
		theta, dy, df := a.theta[j], a.dy[j][:n], a.df[j][:n]
		for i := range df {
			a.f[i] -= theta * (dy[i] + df[i])
		}
	}
	longest := 0.0
	for i, move := range a.f {
		a.y[i] += move
		if move < 0 {
			move = -move
		}
		if !(move <= longest) {
			longest = move
		}
	}
	if longest > 3 || math.IsNaN(longest) { // a wild extrapolation: damped step, forget
		for i := 0; i < n; i++ {
			d := a.fLast[i] * 0.5
			a.y[i] = a.yLast[i] + math.Max(-1.5, math.Min(d, 1.5))
		}
		a.count, a.next, a.have = 0, 0, false
	}
	a.put(gammas)
}

func (a *anderson) put(gammas []float64) {
	n := len(gammas)
	copy(gammas, a.y[:n])
	a.lnWater = math.Min(a.y[n], 0.5)
	a.lnMass = a.y[n+1]
}

// solveTheta minimises |f − Σ θ_j Δf_j|.
func (a *anderson) solveTheta() {
	m := a.count
	if m == 0 {
		return
	}
	for i := 0; i < m; i++ {
		for j := 0; j <= i; j++ {
			a.matrix[i*m+j] = a.gram[i][j]
		}
		a.theta[i] = dot(a.df[i], a.fLast)
	}
	for i := 0; i < m; i++ {
		a.matrix[i*m+i] *= 1 + 1e-12
		a.matrix[i*m+i] += 1e-300
	}
	cholesky(a.matrix[:m*m], m)
	choleskySolve(a.matrix[:m*m], m, a.theta[:m])
}

func dot(a, b []float64) float64 {
	sum := 0.0
	b = b[:len(a)]
	for i, v := range a {
		sum += v * b[i]
	}
	return sum
}
