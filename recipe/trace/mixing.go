package trace

import (
	"errors"
	"fmt"
	"maps"
	"math"

	"dregs/equilibrium"
	"dregs/recipe"
)

// Heat capacities, kJ/(kg K): water alone carries a solution's, as in
// equilibrium.HeatCapacityKJPerK. Common practice, no source.
const (
	waterHeat = 4.18
	solidHeat = 0.9
	inertHeat = 1.0
)

const boilingK = 100 + equilibrium.ZeroCelsius

// batch is what is to come to equilibrium in a tank.
type batch struct {
	totals  []float64
	inertKg float64
	tempK   float64
	present []bool // solids there before or charged
	from    map[string]float64
	near    *equilibrium.State // a state not far off, for a warm start
	heap    []float64          // solids by phase, for a tank that stays dry
	liquid  bool               // there is some; solids alone stay a heap, whatever water their crystals hold
	trial   bool               // only looked at: Liquor.Clear is not wanted
}

// batchOf starts from the contents of a tank.
func (w *walker) batchOf(l *Liquor) *batch {
	b := &batch{totals: append([]float64{}, l.Totals...), inertKg: l.InertKg, tempK: l.TempK,
		liquid:  l.wet(),
		present: make([]bool, len(w.sys.Phases)), from: maps.Clone(l.From), near: l.State, heap: append([]float64{}, l.State.SolidMol...)}
	for _, s := range l.Solids {
		b.present[s.Phase] = true
	}
	return b
}

// heatCapacity of contents, kJ/K.
func (w *walker) heatCapacity(l *Liquor) float64 {
	return w.sys.HeatCapacityKJPerK(l.State) + inertHeat*l.InertKg
}

// addMaterial puts kg of a material into the batch, whose heat capacity before is
// given, and returns the heat capacity after.
func (w *walker) addMaterial(b *batch, heatCapacity float64, c *Charged, kg float64) float64 {
	if kg <= 0 {
		return heatCapacity
	}
	for _, p := range c.Parts {
		b.totals[w.sys.Index(p.Component)] += p.Coefficient * kg
	}
	b.inertKg += c.InertPerKg * kg
	b.liquid = b.liquid || c.liquid
	for _, p := range c.SolidPhases {
		b.present[p] = true
	}
	if len(c.SolidPhases) > 0 && c.molPerKg > 0 {
		b.heap[c.SolidPhases[0]] += c.molPerKg * kg
	}
	b.from[c.Name] += kg
	added := c.heatPerKgK * kg
	warmth := heatCapacity*b.tempK + added*c.TempK
	if heatCapacity > 0 && !math.IsNaN(c.HeatKJPerKg) {
		warmth -= c.HeatKJPerKg * kg
	}
	if heatCapacity+added > 0 {
		b.tempK = warmth / (heatCapacity + added)
	}
	return heatCapacity + added
}

// heatOfWhatDissolves sets the temperature of a batch so that only the part of the
// charge that dissolves there takes up or gives off its heat of solution:
// addMaterial counted it for all of it. The part is found by halving, since more
// dissolving makes it colder and colder liquors hold less.
func (w *walker) heatOfWhatDissolves(out *Step, b *batch, capacity float64) {
	c, kg := out.Charged, out.ChargedKg
	if math.IsNaN(c.HeatKJPerKg) || c.HeatKJPerKg == 0 || c.molPerKg == 0 || len(c.SolidPhases) == 0 || capacity <= 0 || out.Before.MassKg == 0 {
		return
	}
	whole := c.HeatKJPerKg * kg / capacity // K that all of it would take
	none := b.tempK + whole
	dissolves := func(part float64) float64 {
		trial := *b
		trial.totals = append([]float64{}, b.totals...)
		trial.tempK = math.Max(none-whole*part, coldestK)
		l, _, err := w.settle(&trial, air{tank: out.Tank})
		if err != nil {
			return part
		}
		left := 0.0
		for _, p := range c.SolidPhases {
			left += math.Max(l.solidMol(p)-out.Before.solidMol(p), 0)
		}
		return 1 - math.Min(left/out.ChargedMol, 1)
	}
	if dissolves(1) > 1-1e-9 {
		return
	}
	low, high := 0.0, 1.0
	for range 20 {
		middle := (low + high) / 2
		if dissolves(middle) > middle {
			low = middle
		} else {
			high = middle
		}
	}
	b.tempK = math.Max(none-whole*low, coldestK)
}

// coldestK is as cold as a batch is computed: water with salts may be a little
// below 0 °C, the data end there.
const coldestK = equilibrium.ZeroCelsius - 5

// addLiquor mixes a liquor in.
func (w *walker) addLiquor(b *batch, heatCapacity float64, l *Liquor) float64 {
	for i, n := range l.Totals {
		b.totals[i] += n
	}
	b.inertKg += l.InertKg
	b.liquid = b.liquid || l.wet()
	for _, s := range l.Solids {
		b.present[s.Phase] = true
		b.heap[s.Phase] += s.Mol
	}
	for name, kg := range l.From {
		b.from[name] += kg
	}
	added := w.heatCapacity(l)
	if heatCapacity+added > 0 {
		b.tempK = (heatCapacity*b.tempK + added*l.TempK) / (heatCapacity + added)
	}
	if heatCapacity < added {
		b.near = l.State
	}
	return heatCapacity + added
}

// settle brings a batch to equilibrium: what may form in process time forms.
// Gas that left or came is taken into the totals of the liquor returned.
func (w *walker) settle(b *batch, a air) (*Liquor, []GasAmount, error) {
	if b.tempK > boilingK {
		b.tempK = boilingK
	}
	w.sys.Ready(b.tempK, w.allow)
	for p, is := range b.present {
		w.allow[p] = w.allow[p] || is || a.aged
	}
	l := &Liquor{Totals: b.totals, InertKg: b.inertKg, TempK: b.tempK, From: b.from, State: w.sys.NewState()}
	if b.near != nil && b.near.WaterKg > 0 {
		l.State.CopyFrom(b.near)
	}
	c := w.conditions(b.tempK, a, w.allow)
	err := equilibrium.ErrNoWater
	if b.liquid {
		err = w.solver.Solve(b.totals, &c, l.State)
	}
	if err != nil {
		if !errors.Is(err, equilibrium.ErrNoWater) {
			return nil, nil, err
		}
		l.State = w.dryState(b.tempK)
		copy(l.State.SolidMol, b.heap)
		l.Clear = l.State
		w.measure(l)
		return l, nil, nil
	}
	l.Clear = l.State
	if !b.trial && w.formed(l.State, b.present) {
		c.Allowed = b.present
		clear := w.sys.NewState()
		clear.CopyFrom(l.State)
		if w.solver.Solve(b.totals, &c, clear) == nil {
			l.Clear = clear
		}
	}
	out := w.takeGas(l)
	w.measure(l)
	return l, out, nil
}

// formed tells whether a solid stands that was not there before.
func (w *walker) formed(st *equilibrium.State, present []bool) bool {
	for p, n := range st.SolidMol {
		if n > 0 && !present[p] {
			return true
		}
	}
	return false
}

// might is settle for what might have been: nil when it has no solution.
func (w *walker) might(l *Liquor, tempK float64, a air) *Liquor {
	if !l.wet() {
		return nil
	}
	b := w.batchOf(l)
	b.tempK = tempK
	out, _, err := w.settle(b, a)
	if err != nil {
		w.blind("what the liquor may become", fmt.Sprintf("at %.0f °C it could not be computed: %v", tempK-equilibrium.ZeroCelsius, err), w.at)
		return nil
	}
	return out
}

// keep settles a batch in the tank of a step.
func (w *walker) keep(out *Step, b *batch, a air) bool {
	if b.tempK > boilingK+0.5 {
		w.blind(out.What, fmt.Sprintf("mixing would reach %.0f °C; the liquor would boil and is computed at 100 °C", b.tempK-equilibrium.ZeroCelsius), out.At)
	}
	l, gas, err := w.settle(b, a)
	if err != nil {
		w.fail(out.Tank, out.At, out.What, err)
		return false
	}
	out.After, out.GasOut = l, gas
	return true
}

func (w *walker) fail(tank *recipe.Tank, at recipe.Range, what string, err error) {
	w.failed[tank] = true
	w.problem(codeUnsolved, false, at, "", "no equilibrium was found after %q in tank %q, and its later steps are not computed: %v", what, tank.Name, err)
}
