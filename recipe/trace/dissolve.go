package trace

import (
	"math"

	"dregs/equilibrium"
)

// undissolved finds what is left of the charge itself, and how much more water or
// warmth would dissolve it.
func (w *walker) undissolved(out *Step) {
	if out.After == nil || out.Charged == nil || !out.After.wet() || out.ChargedKg <= 0 {
		return
	}
	for _, p := range out.Charged.SolidPhases {
		left := out.After.solidMol(p) - out.Before.solidMol(p)
		if most := out.ChargedMol; most > 0 {
			left = math.Min(left, most)
		}
		if left <= math.Max(nothing*out.After.State.WaterKg, 1e-9*out.ChargedMol) {
			continue
		}
		u := Undissolved{Phase: p, Mol: left, Kg: left * w.sys.Phases[p].MolarMass / 1000}
		u.LeastWaterKg = w.leastWater(out.After, p, out.Before.solidMol(p))
		u.LeastTempK = w.leastTemp(out.After, p, out.Before.solidMol(p))
		out.Undissolved = append(out.Undissolved, u)
	}
}

// trial solves a changed liquor and tells whether no more than kept mol of a
// phase are left.
type trial struct {
	w      *walker
	totals []float64
	st     *equilibrium.State
	allow  []bool
}

func (w *walker) trialOf(l *Liquor) *trial {
	t := &trial{w: w, totals: append([]float64{}, l.Totals...), st: w.sys.NewState(), allow: make([]bool, len(w.sys.Phases))}
	t.st.CopyFrom(l.State)
	return t
}

func (t *trial) dissolves(l *Liquor, tempK float64, phase int, kept float64) bool {
	t.w.sys.Ready(tempK, t.allow)
	for _, s := range l.Solids {
		t.allow[s.Phase] = true
	}
	c := equilibrium.Conditions{TempK: tempK, Allowed: t.allow}
	if t.w.solver.Solve(t.totals, &c, t.st) != nil {
		return false
	}
	return t.st.SolidMol[phase] <= kept+nothing*t.st.WaterKg
}

// leastWater looks up to a thousand times the water there, then halves the
// bracket on a logarithmic scale: 0.1 % after ten halvings of a factor of four.
func (w *walker) leastWater(l *Liquor, phase int, kept float64) float64 {
	t := w.trialOf(l)
	h2o := w.sys.Index("H2O")
	molar := w.molar[h2o]
	enough := func(kg float64) bool {
		t.totals[h2o] = l.Totals[h2o] + kg/molar
		return t.dissolves(l, l.TempK, phase, kept)
	}
	most := 1000 * l.State.WaterKg
	low, high := 0.0, l.State.WaterKg/1024
	for !enough(high) {
		if high >= most {
			return math.NaN()
		}
		low, high = high, math.Min(4*high, most)
	}
	for k := 0; k < 12; k++ {
		middle := 0.5 * (low + high)
		if low > 0 {
			middle = math.Sqrt(low * high)
		}
		if enough(middle) {
			high = middle
		} else {
			low = middle
		}
	}
	return high
}

// leastTemp climbs in steps of 5 K to 100 °C and halves the last one.
func (w *walker) leastTemp(l *Liquor, phase int, kept float64) float64 {
	t := w.trialOf(l)
	var low float64
	high := l.TempK
	for {
		if high >= boilingK {
			return math.NaN()
		}
		low, high = high, math.Min(high+5, boilingK)
		if t.dissolves(l, high, phase, kept) {
			break
		}
	}
	for k := 0; k < 8; k++ {
		if middle := 0.5 * (low + high); t.dissolves(l, middle, phase, kept) {
			high = middle
		} else {
			low = middle
		}
	}
	return high
}
