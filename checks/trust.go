package checks

import (
	"fmt"

	"dregs/equilibrium"
	"dregs/recipe"
	"dregs/recipe/trace"
)

func runRange(p *Pass) {
	runStrength(p)
	runConstants(p)
}

// runStrength tells the first step of each tank that leaves the range of the model.
func runStrength(p *Pass) {
	told := map[string]bool{}
	for _, s := range p.Trace.Steps {
		if s.After == nil || s.After.State == nil || !(s.After.State.WaterKg > 0) {
			continue
		}
		inside, reason := p.Trace.System.ModelRange(s.After.State)
		key := s.Tank.Name
		if inside || told[key] {
			continue
		}
		told[key] = true
		f := blank()
		f.Level = recipe.Note
		if s.After.State.IonicStrength > 6 {
			f.Level = recipe.Caution
		}
		f.Message = "the figures from here on are outside the range of the model: " + reason
		f.Evidence = []string{p.Trace.System.ModelName()}
		p.Report(s, f)
	}
}

// runConstants tells solids whose constant is used outside the temperatures that
// its source vouches for, once a recipe.
func runConstants(p *Pass) {
	told := map[int]bool{}
	for _, s := range p.Trace.Steps {
		if s.After == nil {
			continue
		}
		for _, solid := range s.After.Solids {
			ph := p.Trace.System.Phases[solid.Phase]
			if told[solid.Phase] || ph.LogK.InRange(s.After.TempK) {
				continue
			}
			told[solid.Phase] = true
			f := blank()
			f.Level = recipe.Note
			f.Phase, f.Formula = ph.Name, ph.Formula
			f.Uncertainty = ph.LogK.UncertaintyAt(s.After.TempK)
			f.Message = fmt.Sprintf("%s stands at %.0f °C; its constant is for %s: the amount is less sure (± %.1f in log K)",
				ph.Name, s.After.TempK-equilibrium.ZeroCelsius, span(ph.LogK.MinC, ph.LogK.MaxC), f.Uncertainty)
			f.Evidence = p.evidence(solid.Phase, s.After.State)
			p.Report(s, f)
		}
	}
}

func span(low, high float64) string {
	if high-low < 0.5 {
		return fmt.Sprintf("%.0f °C", low)
	}
	return fmt.Sprintf("%.0f to %.0f °C", low, high)
}

// runMissing tells what the computation left out or took on trust.
func runMissing(p *Pass) {
	for _, m := range p.Trace.Missing {
		f := blank()
		f.Level = recipe.Note
		if m.Blind {
			f.Level = recipe.Caution
		}
		f.At = m.At
		f.Message = m.What + ": " + m.Why
		p.Report(m.Step, f)
	}
	for _, s := range p.Trace.Steps {
		if s.Charged == nil || s.Charged.Substance == nil || s.Source == nil {
			continue
		}
		if form := s.Charged.Substance.Form; len(s.Charged.SolidPhases) == 0 && len(s.Charged.Parts) > 0 && s.Charged.Substance.StrengthWt == 1 && (form == "crystals" || form == "powder" || form == "granules" || form == "flakes") && s.After != nil && s.ChargedKg/s.After.MassKg > 0.05 && !p.hydrateKnown(s.Charged) {
			f := blank()
			f.Level = recipe.Note
			f.Message = fmt.Sprintf("there are no solubility data of %s: it is taken to dissolve", s.Charged.Name)
			p.Report(s, f)
		}
	}
}

// hydrateKnown tells whether some solid of the same salt has data: what stays
// undissolved then stands as that.
func (p *Pass) hydrateKnown(c *trace.Charged) bool {
	dry := map[string]float64{}
	for _, part := range c.Substance.Parts {
		if part.Component != "H2O" {
			dry[part.Component] += part.Coefficient
		}
	}
	for _, ph := range p.Trace.System.Phases {
		same := true
		left := map[string]float64{}
		for _, part := range ph.Parts {
			if part.Component != "H2O" {
				left[part.Component] += part.Coefficient
			}
		}
		for name, n := range dry {
			same = same && left[name] == n
		}
		if same && len(left) == len(dry) {
			return true
		}
	}
	return false
}

func runAnalysis(p *Pass) {
	told := map[string]bool{}
	for _, s := range p.Trace.Steps {
		c := s.Charged
		if c == nil || c.Water == nil || told[c.Name] || c.ImbalanceFraction < p.Thresholds.ImbalanceNote {
			continue
		}
		told[c.Name] = true
		f := blank()
		f.At = c.Water.At
		f.Level = recipe.Note
		if c.ImbalanceFraction > p.Thresholds.ImbalanceAlarm {
			f.Level = recipe.Caution
		}
		f.Message = fmt.Sprintf("the analysis of water %q does not balance: cations and anions differ by %.0f %% of their sum; it was closed with %s", c.Name, 100*c.ImbalanceFraction, Ion(c.BalancedWith))
		f.Evidence = []string{"a sum within 5 % counts as balanced: Standard Methods 1030 E (from memory)"}
		p.Report(s, f)
	}
}

// oxidised are components that air turns into something else. No rate and no
// redox balance is computed.
var oxidised = []struct {
	component, becomes string
	abovePH            float64 // from where it goes within hours; common practice, no source
}{
	{"Fe^2+", "iron(III) hydroxide, far below the pH at which iron(II) comes down", 6},
	{"Mn^2+", "manganese oxides", 8.5},
	{"SO3^2-", "sulfate", 4},
	{"HS^-", "sulfur and thiosulfate", 6},
	{"Co^2+", "cobalt(III) hydroxide", 9},
}

func runOxidation(p *Pass) {
	told := map[string]recipe.Level{}
	for _, s := range p.Trace.Steps {
		if s.After == nil || s.Tank == nil || s.Tank.Headspace.Kind != "air" || !(s.After.SolutionL > 0) {
			continue
		}
		for _, o := range oxidised {
			i := p.Trace.System.Index(o.component)
			if i < 0 || s.After.Totals[i]/s.After.SolutionL < 1e-5 {
				continue
			}
			level := recipe.Note
			if s.After.State.PH > o.abovePH {
				level = recipe.Caution
			}
			key := s.Tank.Name + o.component
			if told[key] >= level {
				continue
			}
			told[key] = level
			f := blank()
			f.Level = level
			f.Message = fmt.Sprintf("air in tank %q may turn %s into %s; that is not computed", s.Tank.Name, Ion(o.component), o.becomes)
			f.Evidence = []string{fmt.Sprintf("pH %.1f, %.0f °C; redox equilibria and rates are outside the computation", s.After.State.PH, s.After.TempK-equilibrium.ZeroCelsius)}
			p.Report(s, f)
		}
	}
}
