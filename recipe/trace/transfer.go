package trace

import (
	"dregs/recipe"
)

// transfer is transfer and decant. Solids travel in proportion, or stay behind
// when the liquor is taken clear.
func (w *walker) transfer(out *Step, s *recipe.Step) {
	from := out.Before
	clear := s.Clear || s.Kind == recipe.Decant
	standing := from.VolumeL
	if clear {
		standing = from.SolutionL
	}
	share := 1.0
	if !s.All && s.Volume != nil {
		wanted := s.Volume.Value
		if s.Volume.Dimension == recipe.Mass && from.MassKg > 0 {
			wanted *= standing / from.MassKg
		}
		switch {
		case wanted > standing*(1+1e-9)+1e-9:
			out.ShortByL = wanted - standing
		case standing > 0:
			share = min(wanted/standing, 1)
		}
	}
	solids := share
	if clear {
		solids = 0
	}
	taken := w.portion(from, share, solids)
	out.After = w.portion(from, 1-share, 1-solids)
	out.Carried = taken.Solids
	for _, p := range taken.Solids {
		out.CarriedKg += p.Kg
	}
	w.deliver(out, s, taken)
}

// deliver puts a liquor into the tank it is meant for, or out of the house.
func (w *walker) deliver(out *Step, s *recipe.Step, taken *Liquor) {
	out.Into = s.Into
	if s.Into == nil {
		w.lose(taken.Totals)
		return
	}
	if s.Into == s.Tank {
		w.problem(codeImpossible, true, s.At, "another tank", "tank %q cannot be emptied into itself", s.Tank.Name)
		w.failed[s.Tank] = true
		return
	}
	if w.failed[s.Into] {
		return
	}
	into := w.tanks[s.Into]
	if into == nil {
		into = w.empty(roomK)
	}
	if s.Over != nil && into.wet() && taken.wet() {
		out.Feed = w.mixingLine(into, w.dissolved(taken), taken.SolutionL)
	}
	b := w.batchOf(into)
	w.addLiquor(b, w.heatCapacity(into), taken)
	l, gas, err := w.settle(b, air{tank: s.Into})
	if err != nil {
		w.fail(s.Into, out.At, out.What, err)
		return
	}
	out.IntoAfter, out.GasOut = l, gas
}

func (w *walker) lose(totals []float64) {
	for i, n := range totals {
		w.lost[i] += n
	}
}

// filter parts liquor and solids. The cake keeps liquor by its moisture; wash
// pushes that out before it, without mixing.
func (w *walker) filter(out *Step, s *recipe.Step) {
	from := out.Before
	solidsKg := w.sys.SolidMassKg(from.State)
	solutionKg := from.MassKg - solidsKg
	held := 0.0 // share of the liquor left in the cake
	if s.Moisture != nil && solutionKg > 0 {
		m := min(max(s.Moisture.Value, 0), 0.99)
		held = min(solidsKg*m/(1-m)/solutionKg, 1)
	}
	out.RemovedKg = solidsKg
	filtrate := w.portion(from, 1-held, 0)
	cake := w.portion(from, held, 1)
	if s.Wash != nil && s.WashWith != "" {
		c := w.tr.Materials[s.WashWith]
		if c == nil || c.unavailable {
			w.failed[s.Tank] = true
			return
		}
		washKg, ok := w.massOf(c, s.Wash)
		if !ok {
			w.failed[s.Tank] = true
			return
		}
		cakeLiquorKg := cake.MassKg - solidsKg
		pushed := 0.0
		if cakeLiquorKg > 0 {
			pushed = min(washKg/cakeLiquorKg, 1)
		}
		throughKg := washKg - pushed*cakeLiquorKg
		b := w.batchOf(filtrate)
		capacity := w.addLiquor(b, w.heatCapacity(filtrate), w.portion(cake, pushed, 0))
		w.addMaterial(b, capacity, c, throughKg)
		washed, _, err := w.settle(b, air{tank: s.Tank})
		if err != nil {
			w.fail(s.Tank, out.At, out.What, err)
			return
		}
		filtrate = washed
		cake = w.portion(cake, 1-pushed, 1)
		for _, p := range c.Parts { // the wash that stays in the cake
			cake.Totals[w.sys.Index(p.Component)] += p.Coefficient * (washKg - throughKg)
		}
		out.Charged, out.ChargedKg = c, washKg
	}
	w.lose(cake.Totals)
	if s.Into == nil {
		out.After = filtrate
		return
	}
	out.After = w.empty(from.TempK)
	w.deliver(out, s, filtrate)
}
