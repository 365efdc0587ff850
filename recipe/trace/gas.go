package trace

import (
	"math"
	"sort"

	"dregs/equilibrium"
	"dregs/recipe"
)

const (
	bubbleBar    = 1.013   // total pressure of an open tank
	airCO2Bar    = 0.00042 // carbon dioxide in air, 420 ppm; common practice
	strippedBar  = 1e-6    // what is left of a gas that another strips
	litresPerMol = 24.06   // of a gas at 20 °C and 1.013 bar, R·T/p
	openHoldS    = 8 * 3600
)

// air says what gas a liquor meets.
type air struct {
	tank  *recipe.Tank
	open  bool               // exchanges with the air
	fixed map[string]float64 // bar, besides what the tank's headspace gives
	aged  bool               // slow solids may form
}

// gasPath is how a gas of the system stands in the totals.
type gasPath struct{ parts []equilibrium.Part }

func (w *walker) gasPaths() {
	for _, g := range w.sys.Gases {
		species, _ := w.db.LookupSpecies(g.Species)
		w.gas = append(w.gas, gasPath{species.Parts})
	}
	w.gasBar = make([]float64, len(w.sys.Gases))
}

// conditions under which a batch in this air settles.
func (w *walker) conditions(tempK float64, a air, allowed []bool) equilibrium.Conditions {
	c := equilibrium.Conditions{TempK: tempK, Allowed: allowed}
	if a.tank == nil {
		return c
	}
	if a.tank.Headspace.Kind != "closed" {
		c.BubbleBar = bubbleBar
	}
	fix := false
	for i, g := range w.sys.Gases {
		w.gasBar[i] = math.NaN()
		if a.tank.Headspace.Kind == "given" {
			if pa, ok := a.tank.Headspace.PartialPa[g.Name]; ok {
				w.gasBar[i], fix = math.Max(pa/1e5, strippedBar), true
			}
		}
		if a.open && g.Name == "CO2" {
			w.gasBar[i], fix = airCO2Bar, true
		}
		if bar, ok := a.fixed[g.Name]; ok {
			w.gasBar[i], fix = math.Max(bar, strippedBar), true
		}
	}
	if fix {
		c.GasBar = w.gasBar
	}
	return c
}

// takeGas moves what gas the state took up or gave off into the totals and lists
// what was given off.
func (w *walker) takeGas(l *Liquor) []GasAmount {
	var out []GasAmount
	for g, n := range l.State.GasInMol {
		if n == 0 {
			continue
		}
		for _, p := range w.gas[g].parts {
			l.Totals[w.sys.Index(p.Component)] += n * p.Coefficient
		}
		if -n > nothing*l.State.WaterKg {
			out = append(out, GasAmount{g, -n, -n * litresPerMol})
		}
	}
	for i := range l.Totals { // rounding of a component that left altogether
		if l.Totals[i] < 0 && i > 1 {
			l.Totals[i] = 0
		}
	}
	sort.SliceStable(out, func(i, j int) bool { return out[i].Gas < out[j].Gas })
	return out
}

// sparged is the air of a sparge: the gas at its pressure; air and nitrogen carry
// off what they do not hold.
func (w *walker) sparged(s *recipe.Step) (air, bool) {
	bar := bubbleBar
	if s.Pressure != nil {
		bar = s.Pressure.Value / 1e5
	}
	a := air{tank: s.Tank, fixed: map[string]float64{}}
	name := s.Gas
	if name == "" {
		name = s.What
	}
	switch name {
	case "air":
		a.fixed["CO2"] = airCO2Bar * bar / bubbleBar
	case "nitrogen", "N2", "argon", "Ar":
		a.fixed["CO2"] = strippedBar
	default:
		alias := map[string]string{"carbon dioxide": "CO2", "ammonia": "NH3", "sulfur dioxide": "SO2", "hydrogen sulfide": "H2S"}
		if formula, ok := alias[name]; ok {
			name = formula
		}
		a.fixed[name] = bar
		for _, g := range w.db.Gases {
			if g.Name == name {
				return a, true
			}
		}
		return a, false
	}
	return a, true
}
