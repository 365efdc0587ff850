package trace

import (
	"math"

	"dregs/recipe"
)

// begin opens the record of a step in a tank.
func (w *walker) begin(s *recipe.Step, tank *recipe.Tank) *Step {
	w.at = s.At
	before := w.tanks[tank]
	if before == nil {
		before = w.empty(roomK)
		w.tanks[tank] = before
	}
	out := &Step{Index: len(w.tr.Steps), Source: s, Stage: w.stage, At: s.At, Tank: tank, Begin: w.minute, Before: before, What: s.Kind.String()}
	if s.What != "" {
		out.What += " " + s.What
	}
	return out
}

// end closes the record, with what might become of the contents.
func (w *walker) end(out *Step, s *recipe.Step) {
	if w.failed[out.Tank] || out.Into != nil && w.failed[out.Into] {
		if out.Into != nil {
			w.failed[out.Into], w.failed[out.Tank] = true, true
		}
		return
	}
	if out.After == nil {
		out.After = same(out.Before)
	}
	w.tanks[out.Tank] = out.After
	if out.Into != nil && out.IntoAfter != nil {
		w.tanks[out.Into] = out.IntoAfter
	}
	out.LowestVolumeL = min(out.Before.VolumeL, out.After.VolumeL)
	out.HighestVolumeL = max(out.Before.VolumeL, out.After.VolumeL)
	for _, span := range []*recipe.Quantity{s.Over, s.For} {
		if span != nil {
			w.minute += span.Value / 60
		}
	}
	out.End = w.minute
	w.perhaps(out, s)
	w.tr.Steps = append(w.tr.Steps, out)
}

// perhaps computes what the contents may become: cold, aired, aged.
func (w *walker) perhaps(out *Step, s *recipe.Step) {
	last := w.last[s]
	inside := air{tank: out.Tank}
	if moved := s.Kind == recipe.Transfer || s.Kind == recipe.Decant; (last || moved) && out.Tank.Coldest != nil {
		from := out.After
		if moved && !from.wet() {
			from = out.Before // the lines carry what has been here
		}
		if t := out.Tank.Coldest.Value; t < from.TempK-0.5 {
			out.Cold = w.might(from, t, inside)
		}
	}
	if last && (out.Tank.Headspace.Kind == "air" || out.Tank.Headspace.Kind == "") && !w.opened(s) {
		out.Air = w.might(out.After, out.After.TempK, air{tank: out.Tank, open: true})
	}
	if s.Kind != recipe.Age && (last || s.Kind == recipe.Hold && s.For != nil && s.For.Value >= 3600) {
		out.Aged = w.might(out.After, out.After.TempK, air{tank: out.Tank, aged: true})
	}
}

// opened tells whether the step itself brought the contents to balance with air.
func (w *walker) opened(s *recipe.Step) bool {
	if s.Tank.Headspace.Kind != "air" && s.Tank.Headspace.Kind != "" {
		return false
	}
	return s.Kind == recipe.Age || s.Kind == recipe.Sparge && (s.Gas == "air" || s.What == "air") ||
		s.Kind == recipe.Hold && s.For != nil && s.For.Value >= openHoldS
}

// step does one step of the recipe.
func (w *walker) step(s *recipe.Step) {
	if s.Kind == recipe.Expect {
		return
	}
	if s.Tank == nil {
		w.problem(codeUnknown, true, s.At, "a tank for the step or for its stage", "step %q has no tank", s.Kind)
		return
	}
	if w.failed[s.Tank] {
		if s.Into != nil {
			w.failed[s.Into] = true
		}
		return
	}
	if s.Kind == recipe.Together {
		w.together(s)
		return
	}
	out := w.begin(s, s.Tank)
	switch s.Kind {
	case recipe.Charge, recipe.Dose, recipe.Seed:
		w.charge(out, s)
	case recipe.Heat, recipe.Cool:
		if s.To != nil {
			b := w.batchOf(out.Before)
			b.tempK = s.To.Value
			w.keep(out, b, air{tank: s.Tank})
		}
	case recipe.Hold, recipe.Age:
		w.stand(out, s)
	case recipe.Adjust:
		w.adjust(out, s)
	case recipe.MakeUp:
		w.makeUp(out, s)
	case recipe.Evaporate:
		w.evaporate(out, s)
	case recipe.Sparge:
		a, known := w.sparged(s)
		if !known {
			w.blind(s.Gas, "no data for this gas in the liquor's chemistry; the sparge is taken to change nothing", s.At)
		}
		w.keep(out, w.batchOf(out.Before), a)
	case recipe.Transfer, recipe.Decant:
		w.transfer(out, s)
	case recipe.Filter:
		w.filter(out, s)
	case recipe.Sample:
		w.read(out, same(out.Before), s)
	}
	w.end(out, s)
}

// stand is hold and age.
func (w *walker) stand(out *Step, s *recipe.Step) {
	a := air{tank: s.Tank, open: w.opened(s), aged: s.Kind == recipe.Age}
	given := s.Tank.Headspace.Kind == "given"
	if (a.open || a.aged || given) && out.Before.wet() {
		w.keep(out, w.batchOf(out.Before), a)
	}
}

// read fills in the contents as a sample would show them.
func (w *walker) read(out *Step, l *Liquor, s *recipe.Step) {
	out.After, out.AtSample = l, l
	if s.ReadAt != nil && l.wet() {
		if at := w.might(l, s.ReadAt.Value, air{tank: s.Tank}); at != nil {
			out.AtSample = at
		}
	}
}

// charge is charge, dose, seed and heel: a material goes in.
func (w *walker) charge(out *Step, s *recipe.Step) {
	c, kg, ok := w.amount(s)
	if !ok {
		w.failed[out.Tank] = true
		return
	}
	out.Charged, out.ChargedKg, out.ChargedMol = c, kg, kg*c.molPerKg
	b := w.batchOf(out.Before)
	before := b.tempK
	capacity := w.addMaterial(b, w.heatCapacity(out.Before), c, kg)
	w.heatOfWhatDissolves(out, b, capacity)
	if !w.keep(out, b, air{tank: out.Tank}) {
		return
	}
	if out.Before.MassKg > 0 {
		out.TempRiseK = b.tempK - before
	}
	w.undissolved(out)
	if share := kg / out.After.MassKg; c.Substance != nil && math.IsNaN(c.HeatKJPerKg) && share > 0.05 && out.Before.MassKg > 0 {
		w.missing(c.Name, "its heat of solution is not known and is not counted in the temperature", out.At)
	}
	if s.Kind == recipe.Dose {
		w.feed(out, out.Before)
	}
}

// together mixes several feeds at once. Only the last of its records shows the
// contents change; the others carry their material and feed line.
func (w *walker) together(s *recipe.Step) {
	begin := w.minute
	b := w.batchOf(w.begin(s, s.Tank).Before)
	start, capacity := b.tempK, w.heatCapacity(w.tanks[s.Tank])
	for i, dose := range s.Doses {
		out := w.begin(dose, s.Tank)
		c, kg, ok := w.amount(dose)
		if !ok {
			w.failed[s.Tank] = true
			return
		}
		out.Charged, out.ChargedKg, out.ChargedMol = c, kg, kg*c.molPerKg
		capacity = w.addMaterial(b, capacity, c, kg)
		w.feed(out, out.Before)
		last := *dose
		last.Over, last.For = nil, nil
		if i == len(s.Doses)-1 {
			if last.Over = s.Over; last.Over == nil {
				last.Over = dose.Over
			}
			if out.Before.MassKg > 0 {
				out.TempRiseK = b.tempK - start
			}
			if !w.keep(out, b, air{tank: s.Tank}) {
				return
			}
			w.undissolved(out)
			w.last[&last] = w.last[s]
		}
		w.end(out, &last)
		out.Begin = begin
	}
	for _, out := range w.tr.Steps {
		if out.Begin == begin && out.End < w.minute && out.Tank == s.Tank && isOneOf(out.Source, s.Doses) {
			out.End = w.minute
		}
	}
}

func isOneOf(s *recipe.Step, list []*recipe.Step) bool {
	for _, other := range list {
		if s == other {
			return true
		}
	}
	return false
}

// amount is the material and mass of a charge.
func (w *walker) amount(s *recipe.Step) (*Charged, float64, bool) {
	c := w.tr.Materials[s.What]
	if c == nil || c.unavailable {
		return nil, 0, false // told when it was resolved
	}
	if s.Amount == nil {
		w.problem(codeImpossible, true, s.At, "a mass, a volume or moles", "%s %q has no amount", s.Kind, s.What)
		return nil, 0, false
	}
	kg, ok := w.massOf(c, s.Amount)
	if ok && s.Temperature != nil {
		warm := *c
		warm.TempK = s.Temperature.Value
		c = &warm
	}
	return c, kg, ok
}

// massOf turns an amount of a material into kg.
func (w *walker) massOf(c *Charged, q *recipe.Quantity) (float64, bool) {
	if !(q.Value >= 0) {
		w.problem(codeImpossible, true, q.At, "an amount of zero or more", "%s cannot be charged", q.Text)
		return 0, false
	}
	switch q.Dimension {
	case recipe.Mass:
		return q.Value, true
	case recipe.Volume:
		if !(c.DensityKgL > 0) {
			w.problem(codeImpossible, true, q.At, "a mass, or a density in the material block", "%q is given by volume and its density is not known", c.Name)
			return 0, false
		}
		return q.Value * c.DensityKgL, true
	case recipe.Amount:
		if !(c.molPerKg > 0) {
			w.problem(codeImpossible, true, q.At, "a mass or a volume", "%q is given in moles and is not one substance", c.Name)
			return 0, false
		}
		return q.Value / c.molPerKg, true
	}
	w.problem(codeImpossible, true, q.At, "a mass, a volume or moles", "%s is no amount of a material", q.Text)
	return 0, false
}
