package trace

import (
	"math"

	"dregs/equilibrium"
	"dregs/recipe"
)

// solvesMost bounds the equilibria computed for one step that seeks a target.
const solvesMost = 60

// with is the contents after kg of a material, as they stand and as they are read
// (at another temperature, when one is given). A trial leaves Liquor.Clear out.
func (w *walker) with(l *Liquor, c *Charged, kg float64, s *recipe.Step, trial bool) (stands, read *Liquor, gas []GasAmount, err error) {
	b := w.batchOf(l)
	b.trial = trial
	w.addMaterial(b, w.heatCapacity(l), c, kg)
	stands, gas, err = w.settle(b, air{tank: s.Tank})
	if err != nil {
		return nil, nil, nil, err
	}
	read = stands
	if s.ReadAt != nil && stands.wet() {
		b := w.batchOf(stands)
		b.tempK, b.trial = s.ReadAt.Value, trial
		read, _, err = w.settle(b, air{tank: s.Tank})
	}
	return stands, read, gas, err
}

// adjust adds of a material what brings the pH to the target, and at most
// at_most. A pH that falls or rises with the addition is bracketed and closed in
// by false position with halving (Illinois), which cannot lose its bracket.
func (w *walker) adjust(out *Step, s *recipe.Step) {
	c := w.tr.Materials[s.With]
	if c == nil || c.unavailable || s.PH == nil {
		w.failed[s.Tank] = true
		return
	}
	if !out.Before.wet() {
		w.problem(codeImpossible, false, s.At, "a liquor to adjust", "tank %q holds no liquor whose pH could be adjusted", s.Tank.Name)
		return
	}
	most, bounded := 10*out.Before.MassKg, false
	if s.AtMost != nil {
		kg, ok := w.massOf(c, s.AtMost)
		if !ok {
			w.failed[s.Tank] = true
			return
		}
		most, bounded = kg, true
	}
	const close = 1e-4    // pH, where the search ends
	const readable = 0.02 // pH, what an electrode tells apart; common practice, no source
	var stands, read *Liquor
	var gas []GasAmount
	var err error
	solves := 0
	miss := func(kg float64) float64 {
		solves++
		stands, read, gas, err = w.with(out.Before, c, kg, s, true)
		if err != nil {
			return math.NaN()
		}
		return read.State.PH - s.PH.Value
	}
	finish := func(kg float64, reached bool) {
		if err == nil {
			stands, read, gas, err = w.with(out.Before, c, kg, s, false)
		}
		if err != nil {
			w.fail(s.Tank, out.At, out.What, err)
			return
		}
		out.Charged, out.ChargedKg, out.ChargedMol = c, kg, kg*c.molPerKg
		out.AdjustReached = reached && math.Abs(read.State.PH-s.PH.Value) < readable
		out.After, out.AtSample, out.GasOut = stands, read, gas
		out.TempRiseK = stands.TempK - out.Before.TempK
		w.undissolved(out)
	}
	low, missLow := 0.0, miss(0)
	if err != nil || math.Abs(missLow) < close {
		finish(0, true)
		return
	}
	high := most
	if !bounded {
		high = 1e-5 * out.Before.MassKg
	}
	missHigh := miss(high)
	for !bounded && err == nil && missHigh*missLow > 0 && high < most && solves < 25 {
		low, missLow = high, missHigh
		high = min(4*high, most)
		missHigh = miss(high)
	}
	for tries := 0; err != nil && tries < 8; tries++ { // as much as that cannot be computed: less
		high /= 4
		missHigh = miss(high)
	}
	if err != nil {
		finish(0, false)
		return
	}
	if missHigh*missLow > 0 {
		kg := high
		if math.Abs(missHigh) > math.Abs(missLow) { // the wrong way
			kg = 0
		}
		finish(kg, false)
		return
	}
	kg, side := high, 0
	for solves < solvesMost {
		if next := (low*missHigh - high*missLow) / (missHigh - missLow); solves%3 != 0 && next > low && next < high {
			kg = next
		} else {
			kg = 0.5 * (low + high)
		}
		at := miss(kg)
		if err != nil || math.Abs(at) < close || high-low < 1e-9*high {
			break
		}
		if at*missHigh > 0 {
			high, missHigh = kg, at
			if side == 1 {
				missLow /= 2
			}
			side = 1
		} else {
			low, missLow = kg, at
			if side == -1 {
				missHigh /= 2
			}
			side = -1
		}
	}
	finish(kg, true)
}

// makeUp adds of a material until the volume (or mass) is there. Volumes are not
// additive, so it goes by the secant.
func (w *walker) makeUp(out *Step, s *recipe.Step) {
	c := w.tr.Materials[s.What]
	if c == nil || c.unavailable || s.To == nil {
		w.failed[s.Tank] = true
		return
	}
	size := func(l *Liquor) float64 { return l.VolumeL }
	density := c.DensityKgL
	if s.To.Dimension == recipe.Mass {
		size, density = func(l *Liquor) float64 { return l.MassKg }, 1
	}
	if !(density > 0) {
		density = 1
	}
	kg, lastKg, lastMiss := 0.0, 0.0, 0.0
	for k := 0; ; k++ {
		stands, read, gas, err := w.with(out.Before, c, kg, s, true)
		if err != nil {
			w.fail(s.Tank, out.At, out.What, err)
			return
		}
		miss := s.To.Value - size(read)
		out.After, out.AtSample, out.GasOut = stands, read, gas
		if k == 0 && miss < 0 {
			if miss < -1e-6*s.To.Value {
				w.missing(out.What, "the tank holds more than the mark already; nothing is added", out.At)
			}
			break
		}
		if math.Abs(miss) < 1e-7*s.To.Value || k == 15 {
			break
		}
		slope := 1 / density
		if k > 0 && kg != lastKg {
			if secant := (lastMiss - miss) / (kg - lastKg); secant > 0.2*slope && secant < 5*slope {
				slope = secant
			}
		}
		lastKg, lastMiss = kg, miss
		kg = max(kg+miss/slope, 0)
	}
	out.Charged, out.ChargedKg, out.ChargedMol = c, kg, kg*c.molPerKg
	out.TempRiseK = out.After.TempK - out.Before.TempK
	w.undissolved(out)
}

// evaporate takes water off: so much, or until so much is left.
func (w *walker) evaporate(out *Step, s *recipe.Step) {
	if !out.Before.wet() {
		w.problem(codeImpossible, false, s.At, "a liquor", "tank %q holds no liquor to evaporate", s.Tank.Name)
		return
	}
	molar := w.molar[w.sys.Index("H2O")]
	off := func(kg float64) (*Liquor, []GasAmount, error) {
		b := w.batchOf(out.Before)
		b.totals[w.sys.Index("H2O")] -= kg / molar
		return w.settle(b, air{tank: s.Tank})
	}
	kg := 0.0
	switch {
	case s.Water != nil && s.Water.Dimension == recipe.Volume:
		kg = s.Water.Value * equilibrium.WaterDensityKgL(roomK) // of the condensate, at 20 °C
	case s.Water != nil:
		kg = s.Water.Value
	case s.To != nil && s.To.Dimension == recipe.Mass:
		kg = max(out.Before.MassKg-s.To.Value, 0)
	case s.To != nil:
		for k := 0; k < 15; k++ {
			l, _, err := off(kg)
			if err != nil || !l.wet() {
				break // told below
			}
			miss := l.VolumeL - s.To.Value
			if math.Abs(miss) < 1e-7*s.To.Value {
				break
			}
			kg = min(max(kg+miss, 0), 0.999*out.Before.State.WaterKg)
		}
	}
	if kg > 0.999*out.Before.State.WaterKg {
		w.problem(codeImpossible, false, s.At, "less water to take off", "%.4g kg of water cannot be taken from %.4g kg", kg, out.Before.State.WaterKg)
		w.failed[s.Tank] = true
		return
	}
	l, gas, err := off(kg)
	if err != nil {
		w.fail(s.Tank, out.At, out.What, err)
		return
	}
	out.After, out.GasOut = l, gas
	w.lost[w.sys.Index("H2O")] += kg / molar
}
