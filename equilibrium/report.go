package equilibrium

import "math"

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
