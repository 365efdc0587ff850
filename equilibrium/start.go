package equilibrium

import "math"

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

// rampSteps is in how many steps a gas pressure is brought to its value.
const rampSteps = 12

// ramp comes to a gas pressure that no start reached, hydrogen sulfide over lead
// for one: first closed, then from the pressure that the liquor has of itself to
// the one given, in equal steps of its logarithm.
func (sv *Solver) ramp(totals []float64, c *Conditions, out *State) error {
	between := *c
	between.GasBar = sv.rampBar
	for g := range sv.rampBar {
		sv.rampBar[g] = 0
	}
	if err := sv.attempt(totals, &between, out); err != nil {
		return err
	}
	copy(sv.rampFrom, out.GasBar)
	for k := 1; k <= rampSteps; k++ {
		for g, bar := range c.GasBar {
			if bar > 0 {
				from := math.Log(math.Max(sv.rampFrom[g], 1e-14))
				sv.rampBar[g] = math.Exp(from + (math.Log(bar)-from)*float64(k)/rampSteps)
			}
		}
		if k == rampSteps {
			between.GasBar = c.GasBar
		}
		if err := sv.attempt(totals, &between, out); err != nil {
			return err
		}
	}
	return nil
}
