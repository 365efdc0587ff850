package equilibrium

import (
	"errors"
	"fmt"
	"math"
)

// Solver finds the equilibrium of a System by minimising the dual
//
//	φ(λ) = Σ_i n_i(λ) − b·λ,   λ = ln activities of the components,
//
// under SI_p(λ) ≤ 0 for every allowed phase p; the multipliers are the moles of
// p. A gas at a fixed pressure is an equality, a gas that may leave as bubbles
// another inequality. φ is convex while activity coefficients γ, the activity of
// water and its mass W are fixed, so Newton's method on the quadratic model with
// the linear constraints (see quadratic) needs no starting guess; far steps are
// shortened until φ plus a penalty for violated constraints falls. γ, a_w and W
// follow in an outer iteration, speeded by Anderson's mixing (Anderson 1965,
// J. ACM 12, 547).
//
// Totals are scaled to 1 kg of water; a component with less than 1e-22 mol/kg
// counts as absent.
//
// A Solver owns its workspace: Solve allocates nothing and is not safe for
// concurrent use. The zero value is not useful; call [System.NewSolver].
type Solver struct {
	sys *System

	// constants at tempK
	tempK, aphi    float64
	lnKSpecies     []float64
	lnKPhase       []float64
	lnKGas         []float64
	allowedDefault []bool

	// the problem of this call, local numbering of active components
	b         []float64 // mol per kg of total water, by component
	most      float64   // the largest of them, water left out
	active    []int32   // local -> component
	local     []int32   // component -> local, -1 when absent
	species   []int32   // active species
	start     []int32   // of active species' rows below
	row       []int32   // local component
	nu        []float64 // its coefficient
	pairStart []int32   // of active species' products ν_c ν_d below
	pairAt    []int32   // place in the Hessian
	pair      []float64
	cons      []constraint
	rows      []float64 // constraint rows, dense over local components
	rhs       []float64

	lambda, trial []float64 // local
	n             []float64 // by active species
	lnC, lnNext   []float64 // ln K + water − ln γ + ln W by active species
	gradient      []float64
	hessian       []float64
	step          []float64
	quad          quadratic

	posed   pose
	mix     anderson
	molal   []float64
	gammas  []float64
	image   []float64 // γ of the molalities reached
	newtons int
}

// pose is what the index tables were made for.
type pose struct {
	done             bool
	tempK, bubbleBar float64
	present, allowed []bool
	gasBar           []float64
}

type constraintKind uint8

const (
	solidPhase constraintKind = iota
	gasFixed
	gasBubble
)

type constraint struct {
	kind  constraintKind
	index int     // phase or gas
	water float64 // coefficient of ln a_w in the row
	lnK   float64
}

// Errors of Solve. They are wrapped with the numbers.
var (
	ErrNoWater       = errors.New("no liquid water is left to dissolve in")
	ErrNegativeTotal = errors.New("a component has a negative amount")
	ErrNotConverged  = errors.New("the equilibrium did not converge")
)

const (
	absentMolal = 1e-22
	ridge       = 1e-10
	farStep     = 25.0 // longest change of a ln activity in one Newton step
	nearStep    = 0.25 // below it a full Newton step needs no check
	outerMost   = 250
	innerMost   = 400
	gammaTol    = 1e-9
)

// NewSolver returns a Solver for the system.
func (s *System) NewSolver() *Solver {
	nc, ns, np, ng := len(s.Components), len(s.Species), len(s.Phases), len(s.Gases)
	most := np + ng
	entries, pairs := len(s.species.component), 0
	for i := range s.Species {
		k := int(s.species.start[i+1] - s.species.start[i])
		pairs += k * (k + 1) / 2
	}
	f := func(n int) []float64 { return make([]float64, n) }
	sv := &Solver{
		sys: s, lnKSpecies: f(ns), lnKPhase: f(np), lnKGas: f(ng), allowedDefault: make([]bool, np),
		b: f(nc), active: make([]int32, 0, nc), local: make([]int32, nc),
		species: make([]int32, 0, ns), start: make([]int32, 0, ns+1), row: make([]int32, 0, entries), nu: make([]float64, 0, entries),
		pairStart: make([]int32, 0, ns+1), pairAt: make([]int32, 0, pairs), pair: make([]float64, 0, pairs),
		cons: make([]constraint, 0, most), rows: f(most * nc), rhs: f(most),
		lambda: f(nc), trial: f(nc), n: f(ns), lnC: f(ns), lnNext: f(ns), gradient: f(nc), hessian: f(nc * nc), step: f(nc),
		molal: f(ns), gammas: f(ns), image: f(ns),
	}
	sv.posed = pose{present: make([]bool, nc), allowed: make([]bool, np), gasBar: f(ng)}
	sv.quad.init(nc, most)
	sv.mix.init(ns + 2)
	return sv
}

// Solve finds the equilibrium of totals (mol by component, solution and solids
// together; the totals of H2O and H^+ included) under the conditions and writes
// it to out. If out holds an earlier state of the same system, that is the warm
// start. On an error out holds the last iterate and must not be used.
func (sv *Solver) Solve(totals []float64, c *Conditions, out *State) error {
	s := sv.sys
	if len(totals) != len(s.Components) || len(out.Molality) != len(s.Species) {
		panic("equilibrium: totals or state of another system")
	}
	if !(c.TempK > 200 && c.TempK < 500) {
		return fmt.Errorf("temperature %.1f K is outside 200 to 500 K", c.TempK)
	}
	if err := sv.pose(totals, c); err != nil {
		return err
	}
	scaleKg := totals[water] * waterMolarMass
	sv.newtons = 0
	err := ErrNotConverged
	if out.seeded {
		sv.warm(out, scaleKg)
		err = sv.outer(0)
	}
	for attempt, damping := range [...]float64{0, 0, 0.4, 0.1} {
		if err == nil || errors.Is(err, ErrNoWater) {
			break
		}
		sv.cold()
		if attempt > 0 {
			sv.free()
		}
		err = sv.outer(damping)
	}
	if err != nil {
		out.seeded = false
		return err
	}
	sv.report(totals, scaleKg, c, out)
	return nil
}

// pose sets up constants, active components, species and constraints.
func (sv *Solver) pose(totals []float64, c *Conditions) error {
	s := sv.sys
	if !(totals[water] > 0) || math.IsInf(totals[water], 0) {
		return fmt.Errorf("%w: total of water is %g mol", ErrNoWater, totals[water])
	}
	scaleKg := totals[water] * waterMolarMass
	for i, t := range totals {
		if math.IsNaN(t) || math.IsInf(t, 0) {
			return fmt.Errorf("total of %s is %g mol", s.Components[i].Name, t)
		}
		sv.b[i] = t / scaleKg
		if i > proton && sv.b[i] < 0 {
			if sv.b[i] < -1e-12 {
				return fmt.Errorf("%w: %s %g mol", ErrNegativeTotal, s.Components[i].Name, t)
			}
			sv.b[i] = 0
		}
	}
	if c.TempK != sv.tempK {
		sv.tempK, sv.aphi = c.TempK, debyeHuckelAphi(c.TempK)
		for i, sp := range s.Species {
			sv.lnKSpecies[i] = ln10 * sp.LogK.At(c.TempK)
		}
		for i, p := range s.Phases {
			sv.lnKPhase[i] = ln10 * p.LogK.At(c.TempK)
		}
		for i, g := range s.Gases {
			sv.lnKGas[i] = ln10*g.LogK.At(c.TempK) - sv.lnKSpecies[s.gasSpecies[i]]
		}
		s.Ready(c.TempK, sv.allowedDefault)
	}
	sv.most = 0
	for _, b := range sv.b[proton:] {
		sv.most = math.Max(sv.most, math.Abs(b))
	}
	if sv.samePose(c) {
		return nil
	}
	for i := range sv.local {
		sv.local[i] = -1
	}
	sv.active = sv.active[:0]
	for i := proton; i < len(s.Components); i++ {
		if i == proton || sv.b[i] > absentMolal {
			sv.activate(i)
		}
	}
	if c.GasBar != nil {
		for g := range s.Gases {
			if c.GasBar[g] > 0 {
				row := &s.species
				for k := row.start[s.gasSpecies[g]]; k < row.start[s.gasSpecies[g]+1]; k++ {
					if i := int(row.component[k]); sv.local[i] < 0 {
						sv.activate(i)
					}
				}
			}
		}
	}
	sv.species, sv.row, sv.nu = sv.species[:0], sv.row[:0], sv.nu[:0]
	sv.start, sv.pairStart = append(sv.start[:0], 0), append(sv.pairStart[:0], 0)
	sv.pairAt, sv.pair = sv.pairAt[:0], sv.pair[:0]
	for i := range s.Species {
		if !sv.present(&s.species, i) {
			continue
		}
		sv.species = append(sv.species, int32(i))
		for k := s.species.start[i]; k < s.species.start[i+1]; k++ {
			sv.row = append(sv.row, sv.local[s.species.component[k]])
			sv.nu = append(sv.nu, s.species.coefficient[k])
		}
		sv.start = append(sv.start, int32(len(sv.row)))
		sv.addPairs(int(sv.start[len(sv.start)-2]), len(sv.row))
	}
	sv.constrain(c)
	return nil
}

// samePose tells whether the components present and the conditions are those of
// the last call, so that its index tables serve again; it remembers them.
func (sv *Solver) samePose(c *Conditions) bool {
	p := &sv.posed
	same := p.done && p.tempK == c.TempK && p.bubbleBar == c.BubbleBar
	p.done, p.tempK, p.bubbleBar = true, c.TempK, c.BubbleBar
	for i, b := range sv.b {
		if present := b > absentMolal; present != p.present[i] {
			p.present[i], same = present, false
		}
	}
	allowed := c.Allowed
	if allowed == nil {
		allowed = sv.allowedDefault
	}
	for i, a := range allowed {
		if a != p.allowed[i] {
			p.allowed[i], same = a, false
		}
	}
	for i := range p.gasBar {
		bar := 0.0
		if c.GasBar != nil && c.GasBar[i] > 0 {
			bar = c.GasBar[i]
		}
		if bar != p.gasBar[i] {
			p.gasBar[i], same = bar, false
		}
	}
	return same
}

// addPairs lists the products of coefficients of one species for the Hessian.
func (sv *Solver) addPairs(first, last int) {
	m := int32(len(sv.active))
	for k := first; k < last; k++ {
		for l := first; l <= k; l++ {
			r, q := sv.row[k], sv.row[l]
			if q > r {
				r, q = q, r
			}
			sv.pairAt = append(sv.pairAt, r*m+q)
			sv.pair = append(sv.pair, sv.nu[k]*sv.nu[l])
		}
	}
	sv.pairStart = append(sv.pairStart, int32(len(sv.pair)))
}

func (sv *Solver) activate(component int) {
	sv.local[component] = int32(len(sv.active))
	sv.active = append(sv.active, int32(component))
}

func (sv *Solver) present(rows *sparse, i int) bool {
	for k := rows.start[i]; k < rows.start[i+1]; k++ {
		if sv.local[rows.component[k]] < 0 {
			return false
		}
	}
	return true
}

// constrain lists the fixed gases first: they are always in the working set.
func (sv *Solver) constrain(c *Conditions) {
	s := sv.sys
	sv.cons = sv.cons[:0]
	for g := range s.Gases {
		if c.GasBar != nil && c.GasBar[g] > 0 && sv.present(&s.species, s.gasSpecies[g]) {
			sv.addConstraint(gasFixed, g, &s.species, s.gasSpecies[g], s.speciesWater[s.gasSpecies[g]], sv.lnKGas[g]+math.Log(c.GasBar[g]))
		}
	}
	sv.quad.equalities = len(sv.cons)
	if c.BubbleBar > 0 {
		for g := range s.Gases {
			if (c.GasBar == nil || !(c.GasBar[g] > 0)) && sv.present(&s.species, s.gasSpecies[g]) {
				sv.addConstraint(gasBubble, g, &s.species, s.gasSpecies[g], s.speciesWater[s.gasSpecies[g]], sv.lnKGas[g]+math.Log(c.BubbleBar))
			}
		}
	}
	allowed := c.Allowed
	if allowed == nil {
		allowed = sv.allowedDefault
	}
	for p := range s.Phases {
		if allowed[p] && sv.present(&s.phases, p) {
			sv.addConstraint(solidPhase, p, &s.phases, p, s.phaseWater[p], sv.lnKPhase[p])
		}
	}
}

func (sv *Solver) addConstraint(kind constraintKind, index int, rows *sparse, i int, water, lnK float64) {
	n := len(sv.active)
	at := len(sv.cons) * n
	dense := sv.rows[at : at+n]
	for k := range dense {
		dense[k] = 0
	}
	for k := rows.start[i]; k < rows.start[i+1]; k++ {
		dense[sv.local[rows.component[k]]] += rows.coefficient[k]
	}
	sv.cons = append(sv.cons, constraint{kind, index, water, lnK})
}

// cold is the start from nothing: every component as its free ion, neutral water.
func (sv *Solver) cold() {
	for k, c := range sv.active {
		if sv.b[c] > absentMolal && c != proton {
			sv.lambda[k] = math.Log(sv.b[c])
		} else {
			sv.lambda[k] = -7 * ln10
		}
	}
	for i := range sv.gammas {
		sv.gammas[i] = 0
	}
	sv.mix.reset()
	sv.mix.lnWater, sv.mix.lnMass = 0, 0
	sv.quad.forget(len(sv.cons))
	sv.prepare(sv.lnC)
	sv.approach()
}

// free goes on from a cold start to the balance of the solution alone, without
// solids and gases: where polynuclear species start out 1e20 times too many, the
// constraints have no sense of scale yet.
func (sv *Solver) free() {
	cons, equalities := sv.cons, sv.quad.equalities
	sv.cons, sv.quad.equalities = sv.cons[:0], 0
	sv.evaluate(sv.lambda[:len(sv.active)])
	_ = sv.newton(0.1) // as far as it comes
	sv.cons, sv.quad.equalities = cons, equalities
	sv.quad.forget(len(sv.cons))
}

// approach brings a cold start near the balance of the solution without solids,
// by the positive continuous fraction method (Carrayrou, Mosé and Behra 2002,
// AIChE J. 48, 894): each component's activity is moved by the logarithm of what
// is there over what should be, both sides kept positive.
func (sv *Solver) approach() {
	m := len(sv.active)
	have, want, most := sv.gradient[:m], sv.step[:m], sv.trial[:m]
	for sweep := 0; sweep < 60; sweep++ {
		for k, c := range sv.active {
			have[k], want[k], most[k] = math.Max(-sv.b[c], 0), math.Max(sv.b[c], 0), 1
		}
		sv.evaluate(sv.lambda[:m])
		for j := range sv.species {
			for k := sv.start[j]; k < sv.start[j+1]; k++ {
				r, v := sv.row[k], sv.nu[k]
				if v > 0 {
					have[r] += v * sv.n[j]
				} else {
					want[r] -= v * sv.n[j]
				}
				if share := math.Abs(v); share > most[r] && sv.n[j]*share > 0.1*(have[r]+want[r]) {
					most[r] = share
				}
			}
		}
		longest := 0.0
		for k := range have {
			move := 0.7 * math.Log(want[k]/have[k]) / most[k]
			if math.IsNaN(move) || math.IsInf(move, 0) {
				continue
			}
			move = math.Max(-30, math.Min(move, 30))
			sv.lambda[k] += move
			longest = math.Max(longest, math.Abs(move))
		}
		if longest < 0.3 {
			return
		}
	}
}

// warm starts from an earlier state.
func (sv *Solver) warm(st *State, scaleKg float64) {
	for k, c := range sv.active {
		sv.lambda[k] = st.LnActivity[c]
		if math.IsInf(sv.lambda[k], 0) || math.IsNaN(sv.lambda[k]) {
			sv.lambda[k] = math.Log(math.Max(sv.b[c], 1e-12))
		}
	}
	copy(sv.gammas, st.LnGamma)
	sv.mix.reset()
	sv.mix.lnWater = st.LnActivity[water]
	sv.mix.lnMass = math.Log(st.WaterKg / scaleKg)
	if !(math.Abs(sv.mix.lnMass) < 1) {
		sv.mix.lnMass = 0
	}
	sv.quad.forget(len(sv.cons))
	for i, con := range sv.cons {
		if i >= sv.quad.equalities && con.kind == solidPhase && st.SolidMol[con.index] > 0 {
			sv.quad.working = append(sv.quad.working, int32(i))
			sv.quad.x[i] = st.SolidMol[con.index] / scaleKg
		}
	}
}

// outer iterates γ, a_w and W around the minimisation: with Anderson's mixing, or
// with plain damping where the mixing runs in a ring between sets of solids.
func (sv *Solver) outer(damping float64) error {
	s := sv.sys
	change := 1.0
	sv.prepare(sv.lnC)
	sv.evaluate(sv.lambda[:len(sv.active)])
	most := outerMost
	if damping > 0 {
		most = int(outerMost / damping)
	}
	for k := 0; k < most; k++ {
		if k > 0 {
			sv.prepare(sv.lnNext)
			sv.follow(nil, sv.lnNext)
		}
		if err := sv.newton(math.Max(1e-7, math.Min(0.1, change))); err != nil {
			return err
		}
		mass := math.Exp(sv.mix.lnMass)
		for i := range sv.molal {
			sv.molal[i] = 0
		}
		bound := 0.0 // water in species and solids, mol
		for j, i := range sv.species {
			sv.molal[i] = sv.n[j] / mass
			bound += sv.n[j] * s.speciesWater[i]
		}
		for _, w := range sv.quad.working {
			con := &sv.cons[w]
			bound += sv.quad.x[w] * con.water
		}
		_, lnWater, _ := s.interactions.activity(sv.aphi, s.charge, sv.molal, sv.image)
		free := sv.b[water] - bound
		lnMass := math.Log(math.Max(free*waterMolarMass, mass*0.5))
		change = sv.mix.residual(sv.gammas, sv.image, lnWater, lnMass)
		if change < gammaTol {
			sv.evaluate(sv.lambda[:len(sv.active)]) // exactly, not by series
			return sv.newton(1e-7)
		}
		if sv.mix.lnMass < -9 {
			return fmt.Errorf("%w: all of it is bound in solids", ErrNoWater)
		}
		if math.IsNaN(change) {
			break
		}
		sv.mix.advance(sv.gammas, damping)
	}
	return fmt.Errorf("%w after %d Newton steps; activity coefficients still move by %.2g", ErrNotConverged, sv.newtons, change)
}

// prepare puts γ, a_w and W into the constants of the minimisation.
func (sv *Solver) prepare(lnC []float64) {
	s := sv.sys
	for j, i := range sv.species {
		lnC[j] = sv.lnKSpecies[i] + s.speciesWater[i]*sv.mix.lnWater - sv.gammas[i] + sv.mix.lnMass
	}
	for i := range sv.cons {
		con := &sv.cons[i]
		sv.rhs[i] = con.lnK - con.water*sv.mix.lnWater
	}
}

// evaluate sets n at λ and returns φ.
func (sv *Solver) evaluate(lambda []float64) float64 {
	phi := 0.0
	for j := range sv.species {
		e := sv.lnC[j]
		for k := sv.start[j]; k < sv.start[j+1]; k++ {
			e += sv.nu[k] * lambda[sv.row[k]]
		}
		if e > 250 {
			e = 250
		}
		n := math.Exp(e)
		sv.n[j] = n
		phi += n
	}
	for k, c := range sv.active {
		phi -= sv.b[c] * lambda[k]
	}
	return phi
}

// follow changes n for a step of λ and new constants lnNew, from the n at hand:
// most changes are small, and a series costs less than an exponential. The error
// is below 2e-14 relative a call.
func (sv *Solver) follow(step []float64, lnNew []float64) {
	for j, old := range sv.lnC[:len(sv.species)] {
		e := 0.0
		if lnNew != nil {
			e = lnNew[j] - old
			sv.lnC[j] = lnNew[j]
		}
		if step != nil {
			for k := sv.start[j]; k < sv.start[j+1]; k++ {
				e += sv.nu[k] * step[sv.row[k]]
			}
		}
		if e < 5e-5 && e > -5e-5 {
			sv.n[j] *= 1 + e*(1+0.5*e)
		} else {
			sv.n[j] *= math.Exp(e)
		}
	}
}

// value is φ from n at λ.
func (sv *Solver) value(lambda []float64) float64 {
	phi := 0.0
	for _, n := range sv.n[:len(sv.species)] {
		phi += n
	}
	for k, c := range sv.active {
		phi -= sv.b[c] * lambda[k]
	}
	return phi
}

// derivatives sets gradient and Hessian of φ from n. The ridge bounds the step of
// a component that is all but wholly in solids: there φ is flat to within the
// rounding of its total, and the solids decide. It vanishes with the step, so the
// balance reached is the true one.
func (sv *Solver) derivatives() {
	m := len(sv.active)
	h := sv.hessian[:m*m]
	for i := range h {
		h[i] = 0
	}
	for k, c := range sv.active {
		sv.gradient[k] = -sv.b[c]
		h[k*m+k] = ridge * math.Abs(sv.b[c])
	}
	// What a gas at fixed pressure brings may come to as much as anything there.
	for i := range sv.cons[:sv.quad.equalities] {
		for k, a := range sv.rows[i*m : i*m+m] {
			if a != 0 {
				h[k*m+k] = math.Max(h[k*m+k], ridge*sv.most)
			}
		}
	}
	for j, n := range sv.n[:len(sv.species)] {
		for k := sv.start[j]; k < sv.start[j+1]; k++ {
			sv.gradient[sv.row[k]] += sv.nu[k] * n
		}
		for k := sv.pairStart[j]; k < sv.pairStart[j+1]; k++ {
			h[sv.pairAt[k]] += sv.pair[k] * n
		}
	}
}

// newton minimises φ from the n at hand until a full step is below tol.
func (sv *Solver) newton(tol float64) error {
	m := len(sv.active)
	lambda, trial := sv.lambda[:m], sv.trial[:m]
	for k := 0; k < innerMost; k++ {
		sv.newtons++
		sv.derivatives()
		if !sv.quad.solve(m, len(sv.cons), sv.hessian, sv.gradient, sv.rows, sv.rhs, lambda, sv.step) {
			return fmt.Errorf("%w: the solids named cannot all be in balance", ErrNotConverged)
		}
		longest := 0.0
		for _, d := range sv.step[:m] {
			longest = math.Max(longest, math.Abs(d))
		}
		if math.IsNaN(longest) {
			return fmt.Errorf("%w: numbers overflow", ErrNotConverged)
		}
		alpha := 1.0
		if longest > farStep {
			alpha = farStep / longest
		}
		if longest <= nearStep {
			for i := range lambda {
				lambda[i] += sv.step[i]
			}
			sv.follow(sv.step[:m], nil)
			if longest < tol {
				return nil
			}
			continue
		}
		before := sv.value(lambda) + sv.penalty(lambda)
		for try := 0; ; try++ {
			for i := range trial {
				trial[i] = lambda[i] + alpha*sv.step[i]
			}
			if sv.evaluate(trial)+sv.penalty(trial) <= before+1e-12*math.Abs(before) || try == 30 {
				break
			}
			alpha *= 0.5
		}
		copy(lambda, trial)
	}
	return fmt.Errorf("%w within %d Newton steps", ErrNotConverged, innerMost)
}

// penalty makes φ an exact merit function: twice the multiplier (at least a
// floor) times each violation.
func (sv *Solver) penalty(lambda []float64) float64 {
	m := len(lambda)
	sum := 0.0
	for i := range sv.cons {
		v := -sv.rhs[i]
		row := sv.rows[i*m : i*m+m]
		for k, a := range row {
			v += a * lambda[k]
		}
		if v > 0 || i < sv.quad.equalities {
			sum += math.Abs(v) * (1e-3 + 2*math.Abs(sv.quad.x[i]))
		}
	}
	return sum
}

// report writes the solution to out.
func (sv *Solver) report(totals []float64, scaleKg float64, c *Conditions, out *State) {
	s := sv.sys
	mass := math.Exp(sv.mix.lnMass)
	out.TempK = c.TempK
	out.WaterKg = mass * scaleKg
	out.Iterations = sv.newtons
	for i := range out.LnActivity {
		out.LnActivity[i] = math.Inf(-1)
	}
	for k, comp := range sv.active {
		out.LnActivity[comp] = sv.lambda[k]
	}
	out.LnActivity[water] = sv.mix.lnWater
	out.WaterActivity = math.Exp(sv.mix.lnWater)
	out.PH = -out.LnActivity[proton] / ln10
	copy(out.LnGamma, sv.gammas)
	for i := range out.Molality {
		out.Molality[i] = 0
	}
	for j, i := range sv.species {
		out.Molality[i] = sv.n[j] / mass
	}
	ionic, osmotic, net, gross := 0.0, 0.0, 0.0, 0.0
	for i, m := range out.Molality {
		z := s.charge[i]
		osmotic += m
		ionic += 0.5 * m * z * z
		net += m * z
		gross += m * math.Abs(z)
	}
	out.IonicStrength, out.Osmotic = ionic, osmotic
	out.ChargeError = 0
	if gross > 0 {
		out.ChargeError = math.Abs(net) / gross
	}
	for i := range out.SolidMol {
		out.SolidMol[i] = 0
	}
	for g := range out.GasInMol {
		out.GasInMol[g] = 0
	}
	for i, con := range sv.cons {
		x := sv.quad.x[i] * scaleKg
		switch {
		case con.kind == solidPhase:
			out.SolidMol[con.index] = math.Max(x, 0)
		default:
			out.GasInMol[con.index] = -x
		}
	}
	for p := range s.Phases {
		out.Index[p] = math.Inf(-1)
		if sv.present(&s.phases, p) {
			out.Index[p] = (s.phases.dot(p, out.LnActivity) + s.phaseWater[p]*sv.mix.lnWater - sv.lnKPhase[p]) / ln10
		}
	}
	for g, i := range s.gasSpecies {
		out.GasBar[g] = 0
		if sv.present(&s.species, i) {
			out.GasBar[g] = math.Exp(s.species.dot(i, out.LnActivity) + s.speciesWater[i]*sv.mix.lnWater - sv.lnKGas[g])
		}
	}
	sv.balance(out, mass)
	out.seeded = true
}

// balance measures how well the totals are met.
func (sv *Solver) balance(out *State, mass float64) {
	m := len(sv.active)
	scale := sv.step[:m] // magnitudes
	for k, c := range sv.active {
		sv.gradient[k] = -sv.b[c]
		scale[k] = math.Abs(sv.b[c])
	}
	for j := range sv.species {
		for k := sv.start[j]; k < sv.start[j+1]; k++ {
			v := sv.nu[k] * sv.n[j]
			sv.gradient[sv.row[k]] += v
			scale[sv.row[k]] = math.Max(scale[sv.row[k]], math.Abs(v))
		}
	}
	for i := range sv.cons {
		if x := sv.quad.x[i]; x != 0 {
			for k, a := range sv.rows[i*m : i*m+m] {
				sv.gradient[k] += a * x
				scale[k] = math.Max(scale[k], math.Abs(a*x))
			}
		}
	}
	out.BalanceError = 0
	for k := range scale {
		if scale[k] > 0 {
			out.BalanceError = math.Max(out.BalanceError, math.Abs(sv.gradient[k])/scale[k])
		}
	}
}
