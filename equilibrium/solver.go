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

	rampBar, rampFrom []float64 // pressures on the way, see ramp
	posed             pose
	mix               anderson
	molal             []float64
	gammas            []float64
	image             []float64 // γ of the molalities reached
	scratch           []float64 // of the activity model
	newtons           int
	lastStep          float64
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
		molal: f(ns), gammas: f(ns), image: f(ns), scratch: f(2 * ns),
	}
	sv.posed = pose{present: make([]bool, nc), allowed: make([]bool, np), gasBar: f(ng)}
	sv.rampBar, sv.rampFrom = f(ng), f(ng)
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
	err := sv.attempt(totals, c, out)
	if errors.Is(err, ErrNotConverged) && c.GasBar != nil {
		err = sv.ramp(totals, c, out)
	}
	return err
}

// attempt solves from the warm start that out holds, then from cold ones.
func (sv *Solver) attempt(totals []float64, c *Conditions, out *State) error {
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
		_, lnWater, _ := s.interactions.activity(sv.aphi, s.charge, sv.molal, sv.image, sv.scratch)
		free := sv.b[water] - bound
		lnMass := math.Log(math.Max(free*waterMolarMass, mass*0.5))
		change = sv.mix.residual(sv.gammas, sv.image, lnWater, lnMass)
		if change < gammaTol {
			sv.evaluate(sv.lambda[:len(sv.active)]) // exactly, not by series
			if sv.lastStep < 1e-7 {
				return nil // the next step would be its square
			}
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
			if sv.lastStep = longest; longest < tol {
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
