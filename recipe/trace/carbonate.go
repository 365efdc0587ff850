package trace

import (
	"fmt"
	"math"

	"dregs/equilibrium"
)

// carbonate brings a water to its stated pH. With alkalinity A (at the end point
// where all carbonate is CO2) held, inorganic carbon C is what may move: its
// protons are 2C − A, so each mole of C comes with two protons, and its charge is
// nil. More carbon, lower pH. Without alkalinity acid or base does it, as
// hydrochloric acid or caustic.
func (w *walker) carbonate(c *Charged, m *mixture, perKg []float64) {
	if m.water.PH == nil {
		w.missing(c.Name, "the analysis gives no pH; its carbonate is taken as bicarbonate", m.at)
		return
	}
	want := m.water.PH.Value
	hydrogen, carbon := w.sys.Index("H^+"), w.sys.Index("CO3^2-")
	base := append([]float64{}, perKg...)
	h2o := w.sys.Index("H2O")
	var st *equilibrium.State
	miss := func() float64 {
		st = w.alone(perKg, c.TempK, st)
		if st == nil {
			return math.NaN()
		}
		return st.PH - want
	}
	// seek closes in on the u where change(u) gives the pH; it falls with u.
	seek := func(low, high float64, change func(u float64)) bool {
		at := func(u float64) float64 {
			copy(perKg, base)
			change(u)
			return miss()
		}
		if a, b := at(low), at(high); !(a >= 0 && b <= 0) {
			return false
		}
		for k := 0; k < 60 && high-low > 1e-11*math.Max(1, math.Abs(high)); k++ {
			middle := 0.5 * (low + high)
			switch v := at(middle); {
			case math.IsNaN(v):
				return false
			case v > 0:
				low = middle
			default:
				high = middle
			}
		}
		return true
	}
	alkaline := base[carbon] > 0
	if alkaline {
		protons := base[hydrogen] - 2*base[carbon]
		ok := seek(math.Log(1e-9), math.Log(3), func(u float64) {
			perKg[carbon] = math.Exp(u)
			perKg[hydrogen] = 2*perKg[carbon] + protons
			perKg[h2o] -= (perKg[carbon] - base[carbon])
		})
		if ok {
			return
		}
		w.missing(c.Name, fmt.Sprintf("no amount of carbonate gives pH %.2f with the alkalinity stated; acid or caustic is taken to make it", want), m.at)
	}
	ok := seek(-21, 21, func(u float64) {
		acid := 1e-9 * math.Sinh(u)
		perKg[hydrogen] += acid
		if acid > 0 {
			perKg[w.sys.Index("Cl^-")] += acid
		} else {
			perKg[w.sys.Index("Na^+")] -= acid
		}
	})
	if !ok {
		copy(perKg, base)
		w.missing(c.Name, fmt.Sprintf("pH %.2f could not be reached with this analysis; its pH is computed from the ions", want), m.at)
	}
}
