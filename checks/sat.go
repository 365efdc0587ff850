package checks

import (
	"fmt"

	"dregs/equilibrium"
	"dregs/recipe"
	"dregs/recipe/trace"
)

// might reports solids of a liquor as it might become, once a tank and phase.
func (p *Pass) might(pick func(*trace.Step) *trace.Liquor, tell func(*trace.Step, *Finding, *trace.Liquor)) {
	seen := map[string]bool{}
	for _, s := range p.Trace.Steps {
		l := pick(s)
		if l == nil || s.After == nil || l.SolutionL <= 0 {
			continue
		}
		for _, solid := range l.Solids {
			ph := p.Trace.System.Phases[solid.Phase]
			key := s.Tank.Name + "|" + ph.Name
			here := molOf(s.After, solid.Phase)
			if seen[key] || ph.Forms == equilibrium.FormsSlow || p.planned(solid.Phase, s) || solid.Mol <= here*1.1 {
				continue
			}
			seen[key] = true
			f := p.ofSolid(solid.Phase, solid.Mol-here, l)
			tell(s, &f, l)
			p.byAmount(&f)
			p.Report(s, f)
		}
	}
}

func runCold(p *Pass) {
	p.might(func(s *trace.Step) *trace.Liquor { return s.Cold }, func(s *trace.Step, f *Finding, l *trace.Liquor) {
		f.Message = fmt.Sprintf("%s comes down where it gets as cold as %.0f °C: up to %s (%s)", f.Phase, l.TempK-equilibrium.ZeroCelsius, mass(f.AmountG), perLitre(f.AmountGPerL))
	})
}

func runAir(p *Pass) {
	p.might(func(s *trace.Step) *trace.Liquor { return s.Air }, func(s *trace.Step, f *Finding, l *trace.Liquor) {
		change := "takes up carbon dioxide from"
		if l.State.PH > s.After.State.PH {
			change = "loses carbon dioxide to"
		}
		f.Message = fmt.Sprintf("if the liquor %s the air, %s comes down: up to %s (%s), at pH %.1f", change, f.Phase, mass(f.AmountG), perLitre(f.AmountGPerL), l.State.PH)
		if f.AmountGPerL < p.Thresholds.AirGPerL {
			f.Level = recipe.Note
		}
	})
}
