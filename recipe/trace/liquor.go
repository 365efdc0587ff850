package trace

import (
	"math"

	"dregs/equilibrium"
)

const roomK = 20 + equilibrium.ZeroCelsius

// nothing is the least solid, mol per kg of water, that counts as present.
const nothing = 1e-12

const (
	inertDensityKgL = 1.0 // common practice, no source
	heapDensityKgL  = 2.2 // of dry solids, as in equilibrium.SolidVolumeL
)

// dryState is the state of a tank without liquid: solids and nothing else.
func (w *walker) dryState(tempK float64) *equilibrium.State {
	st := w.sys.NewState()
	st.TempK, st.PH, st.WaterActivity = tempK, math.NaN(), math.NaN()
	for i := range st.LnActivity {
		st.LnActivity[i] = math.Inf(-1)
	}
	for i := range st.Index {
		st.Index[i] = math.Inf(-1)
	}
	return st
}

func (w *walker) empty(tempK float64) *Liquor {
	st := w.dryState(tempK)
	return &Liquor{Totals: make([]float64, len(w.sys.Components)), TempK: tempK, State: st, Clear: st, From: map[string]float64{}}
}

// measure fills in volumes, mass and the list of solids.
func (w *walker) measure(l *Liquor) {
	l.MassKg = l.InertKg
	for i, n := range l.Totals {
		l.MassKg += n * w.molar[i]
	}
	l.SolutionL = 0
	if l.wet() {
		l.SolutionL = w.sys.VolumeL(l.State)
	}
	l.VolumeL = l.SolutionL + w.sys.SolidVolumeL(l.State) + l.InertKg/inertDensityKgL
	if !l.wet() {
		l.VolumeL = (l.MassKg-l.InertKg)/heapDensityKgL + l.InertKg/inertDensityKgL
	}
	l.Solids = nil
	for p, n := range l.State.SolidMol {
		if n > nothing*l.State.WaterKg && n > 0 {
			l.Solids = append(l.Solids, PhaseAmount{p, n, n * w.sys.Phases[p].MolarMass / 1000})
		}
	}
}

// wet tells whether there is liquid.
func (l *Liquor) wet() bool { return l.State.WaterKg > 0 }

func (l *Liquor) solidMol(phase int) float64 { return l.State.SolidMol[phase] }

// dissolved is what of each component is not in solids.
func (w *walker) dissolved(l *Liquor) []float64 {
	out := append([]float64{}, l.Totals...)
	w.addSolids(out, l.State, -1)
	return out
}

func (w *walker) addSolids(totals []float64, st *equilibrium.State, times float64) {
	for p, n := range st.SolidMol {
		if n == 0 {
			continue
		}
		for _, part := range w.sys.Phases[p].Parts {
			totals[w.sys.Index(part.Component)] += times * n * part.Coefficient
		}
	}
}

// portion is a part of a liquor: so much of its solution, so much of its solids.
// Nothing reacts, so its state is the same in other amounts.
func (w *walker) portion(l *Liquor, ofSolution, ofSolids float64) *Liquor {
	out := &Liquor{Totals: make([]float64, len(l.Totals)), InertKg: l.InertKg * ofSolution, TempK: l.TempK, From: map[string]float64{}}
	if ofSolution == ofSolids {
		for i, n := range l.Totals {
			out.Totals[i] = n * ofSolution
		}
	} else {
		for i, n := range w.dissolved(l) {
			out.Totals[i] = math.Max(n, 0) * ofSolution
			if i == w.sys.Index("H^+") {
				out.Totals[i] = n * ofSolution
			}
		}
		w.addSolids(out.Totals, l.State, ofSolids)
	}
	st := w.sys.NewState()
	if ofSolution > 0 && l.wet() {
		st.CopyFrom(l.State)
		st.WaterKg *= ofSolution
	} else {
		st = w.dryState(l.TempK)
	}
	for p, n := range l.State.SolidMol {
		st.SolidMol[p] = n * ofSolids
	}
	out.State, out.Clear = st, st
	w.measure(out)
	if l.MassKg > 0 {
		share := out.MassKg / l.MassKg
		for name, kg := range l.From {
			if kg*share > 0 {
				out.From[name] = kg * share
			}
		}
	}
	return out
}

// same is the liquor as a step that changes nothing leaves it.
func same(l *Liquor) *Liquor {
	out := *l
	out.Clear = out.State
	return &out
}
