package checks

import (
	"fmt"
	"math"
	"strings"

	"dregs/equilibrium"
	"dregs/recipe"
	"dregs/recipe/trace"
)

func runSample(p *Pass) {
	for _, s := range p.Trace.Steps {
		if s.Source == nil || s.Source.Kind != recipe.Sample || s.After == nil {
			continue
		}
		l := s.AtSample
		if l == nil {
			l = s.After
		}
		for _, limit := range s.Source.Limits {
			p.limit(s, l, limit)
		}
	}
	for _, s := range p.Trace.Steps {
		if s.Source != nil && s.Source.Kind == recipe.Adjust && s.After != nil && !s.AdjustReached && s.Source.PH != nil {
			f := blank()
			f.Message = fmt.Sprintf("pH %g is not reached with what may be added of %s: it ends at %.2f", s.Source.PH.Value, s.Source.With, s.After.State.PH)
			p.Report(s, f)
		}
	}
}

func (p *Pass) limit(s *trace.Step, l *trace.Liquor, limit recipe.Limit) {
	f := blank()
	f.At = limit.At
	bound := limit.High
	if bound == nil {
		bound = limit.Low
	}
	if bound == nil {
		return
	}
	value, unit, ok := p.reading(l, limit.What, bound)
	if !ok {
		f.Level = recipe.Caution
		f.Message = fmt.Sprintf("the limit of %s cannot be checked: the computation has nothing of that name", limit.What)
		p.Report(s, f)
		return
	}
	slack := 1e-9 * math.Abs(value)
	switch {
	case limit.High != nil && value > limit.High.Value+slack:
		f.Message = fmt.Sprintf("%s will read %s, at most %s is accepted", limit.What, unit(value), limit.High.Text)
	case limit.Low != nil && value < limit.Low.Value-slack:
		f.Message = fmt.Sprintf("%s will read %s, at least %s is accepted", limit.What, unit(value), limit.Low.Text)
	default:
		return
	}
	if inside, reason := p.Trace.System.ModelRange(l.State); !inside {
		f.Evidence = append(f.Evidence, "outside the range of the model: "+reason)
	}
	f.Evidence = append(f.Evidence, p.Trace.System.ModelName())
	p.Report(s, f)
}

// reading is what a sample shows, in the unit in which the bound is held.
func (p *Pass) reading(l *trace.Liquor, what string, bound *recipe.Quantity) (float64, func(float64) string, bool) {
	plain := func(format string) func(float64) string {
		return func(v float64) string { return fmt.Sprintf(format, v) }
	}
	switch strings.ToLower(what) {
	case "ph":
		return l.State.PH, plain("%.2f"), true
	case "temperature":
		return l.TempK, func(v float64) string { return fmt.Sprintf("%.1f °C", v-equilibrium.ZeroCelsius) }, true
	case "density":
		return p.Trace.System.SolutionMassKg(l.State) / l.SolutionL, plain("%.3f kg/L"), true
	case "volume":
		return l.VolumeL, plain("%.0f L"), true
	case "solids":
		kg := l.InertKg
		for _, s := range l.Solids {
			kg += s.Kg
		}
		if bound.Dimension == recipe.Mass {
			return kg, plain("%.3g kg"), true
		}
		return kg / l.VolumeL, func(v float64) string { return perLitre(v * 1000) }, true
	}
	mol, molarMass, ok := p.total(l, what)
	if !ok {
		return 0, nil, false
	}
	if bound.As != "" {
		formula, err := equilibrium.ParseFormula(bound.As)
		if err != nil {
			return 0, nil, false
		}
		molarMass = formula.MolarMass() / perUnit(what, formula)
	}
	switch bound.Dimension {
	case recipe.MolPerVolume:
		return mol / l.SolutionL, plain("%.3g mol/L"), true
	case recipe.Molality:
		return mol / l.State.WaterKg, plain("%.3g mol/kg"), true
	case recipe.MassFraction:
		return mol * molarMass / 1000 / p.Trace.System.SolutionMassKg(l.State), func(v float64) string { return fmt.Sprintf("%.3g wt%%", 100*v) }, true
	}
	return mol * molarMass / 1000 / l.SolutionL, func(v float64) string { return perLitre(v * 1000) }, true
}

// perUnit is how many atoms of an element a formula it is counted as holds.
func perUnit(what string, formula equilibrium.Formula) float64 {
	if n := formula.Counts[what]; n > 0 {
		return n
	}
	return 1
}

// total is what is dissolved of an ion or element.
func (p *Pass) total(l *trace.Liquor, what string) (mol, molarMass float64, ok bool) {
	sys := p.Trace.System
	name := strings.SplitN(what, "^", 2)[0]
	for _, c := range sys.Components {
		if c.Name == "H2O" || c.Name == "H^+" {
			continue
		}
		base := strings.TrimSuffix(strings.SplitN(c.Name, "^", 2)[0], "(aq)")
		per := 0.0
		if base == name || c.Name == what {
			per, molarMass = 1, c.MolarMass
		} else if e, isElement := equilibrium.LookupElement(name); isElement && name != "H" && name != "O" && name != "C" && c.Formula.Counts[name] > 0 {
			per, molarMass = c.Formula.Counts[name], e.AtomicWeight
		}
		if per == 0 {
			continue
		}
		ok = true
		for i, sp := range sys.Species {
			for _, part := range sp.Parts {
				if part.Component == c.Name {
					mol += per * part.Coefficient * l.State.Molality[i] * l.State.WaterKg
				}
			}
		}
	}
	return mol, molarMass, ok
}
