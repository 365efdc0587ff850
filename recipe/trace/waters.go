package trace

import (
	"math"

	"dregs/equilibrium"
	"dregs/recipe"
)

// unnamed is the imbalance of an analysis below which its closing is rounding.
const unnamed = 1e-4

// compose turns a mixture into moles per kg. Amounts by volume need the density,
// and the density the composition: a few rounds settle both.
func (w *walker) compose(c *Charged, m *mixture) {
	density, known := c.DensityKgL, c.DensityKgL > 0
	if !known {
		density = equilibrium.WaterDensityKgL(c.TempK)
	}
	waterFraction := 1.0
	var perKg []float64
	var st *equilibrium.State
	for round := 0; round < 30; round++ {
		perKg = make([]float64, len(w.sys.Components))
		if !w.gather(c, m, perKg, density, waterFraction) {
			c.unavailable = true
			return
		}
		left := 1 - c.InertPerKg - w.massOfTotals(perKg)
		h2o := w.sys.Index("H2O")
		dissolvedKg := 1 - c.InertPerKg - left
		if left < -1e-3 {
			w.problem(codeImpossible, true, m.at, "contents of 100 % or less", "the contents of %q weigh %.4g kg in each kg of it", c.Name, 1-left)
			c.unavailable = true
			return
		}
		left = math.Max(left, 0)
		moved := math.Abs(left - waterFraction)
		perKg[h2o] += left / w.molar[h2o]
		waterFraction = left
		if perKg[h2o] <= 0 {
			break
		}
		next := density
		if !known {
			st = w.alone(perKg, c.TempK, st)
			if st == nil {
				if dissolvedKg > 0.3 {
					w.missing(c.Name, "its density is not given and could not be computed: taken as water's", m.at)
				}
				break
			}
			next = 1 / (w.sys.VolumeL(st) + c.InertPerKg/inertDensityKgL)
		}
		if round > 0 && math.Abs(next-density) < 1e-9 && moved < 1e-10 {
			break
		}
		density = next
	}
	c.DensityKgL = density
	if m.water != nil {
		w.carbonate(c, m, perKg)
	}
	c.Parts = w.partsOf(perKg)
	c.heatPerKgK = waterHeat*waterFraction + inertHeat*c.InertPerKg
	c.liquid = waterFraction > 0.05
}

// gather adds up the lines and closes the balance of charges; for a water the
// alkalinity counts as HCO3^-.
func (w *walker) gather(c *Charged, m *mixture, perKg []float64, density, waterFraction float64) bool {
	cations, anions := 0.0, 0.0
	for _, l := range m.lines {
		n, err := molPerKg(l, density, waterFraction)
		if err != nil {
			w.problem(codeImpossible, true, l.amount.At, "a concentration such as 82 mg/L or 50 wt%", "%s of %q: %v", l.name, c.Name, err)
			return false
		}
		for _, p := range l.parts {
			if p.Component != "H2O" { // the rest is water
				perKg[w.sys.Index(p.Component)] += n * p.Coefficient
			}
		}
		charge := l.charge
		if m.water != nil && bare(l.name) == "PO4" {
			perKg[w.sys.Index("H^+")] += 2 * n
			charge = -1
		}
		cations += math.Max(charge, 0) * n
		anions += math.Max(-charge, 0) * n
	}
	if m.alkalinity != nil {
		a := alkalinityPerKg(m.alkalinity, density)
		perKg[w.sys.Index("CO3^2-")] += a
		perKg[w.sys.Index("H^+")] += a
		anions += a
	}
	c.InertPerKg = 0
	for _, l := range m.inert {
		if q := l.amount; q.Dimension == recipe.MassFraction {
			c.InertPerKg += q.Value
		} else if q.Dimension == recipe.MassPerVolume {
			c.InertPerKg += q.Value / density
		}
	}
	if sum := cations + anions; sum > 0 {
		c.ImbalanceFraction = math.Abs(cations-anions) / sum
	}
	switch net := cations - anions; {
	case c.ImbalanceFraction < 1e-9:
		c.ImbalanceFraction = 0
	case net > 0 && m.water != nil && m.alkalinity == nil && m.water.PH != nil && m.water.PH.Value > 5 && !m.has("HCO3") && !m.has("CO3"):
		// A water without a word on its alkalinity: the gap is the alkalinity.
		w.missing(c.Name, "the analysis gives no alkalinity; what the ions leave open is taken as alkalinity", m.at)
		c.BalancedWith, c.ImbalanceFraction = "HCO3^-", 0
		perKg[w.sys.Index("CO3^2-")] += net
		perKg[w.sys.Index("H^+")] += net
	case net > 0:
		c.BalancedWith = "Cl^-"
		perKg[w.sys.Index("Cl^-")] += net
	default:
		c.BalancedWith = "Na^+"
		perKg[w.sys.Index("Na^+")] -= net
	}
	if c.ImbalanceFraction < unnamed && c.BalancedWith != "HCO3^-" {
		c.BalancedWith = ""
	}
	return true
}

func (m *mixture) has(name string) bool {
	for _, l := range m.lines {
		if bare(l.name) == name {
			return true
		}
	}
	return false
}

// alone solves 1 kg of a mixture by itself, clear; nil when that fails.
func (w *walker) alone(perKg []float64, tempK float64, near *equilibrium.State) *equilibrium.State {
	if near == nil {
		near = w.sys.NewState()
	}
	cond := equilibrium.Conditions{TempK: tempK, Allowed: make([]bool, len(w.sys.Phases))}
	if w.solver.Solve(perKg, &cond, near) != nil {
		return nil
	}
	return near
}

func (w *walker) massOfTotals(totals []float64) float64 {
	sum := 0.0
	for i, n := range totals {
		sum += n * w.molar[i]
	}
	return sum
}

func (w *walker) partsOf(perKg []float64) []equilibrium.Part {
	var out []equilibrium.Part
	for i, n := range perKg {
		if n != 0 {
			out = append(out, equilibrium.Part{Component: w.sys.Components[i].Name, Coefficient: n})
		}
	}
	return out
}
