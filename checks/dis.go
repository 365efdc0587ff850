package checks

import (
	"fmt"
	"math"

	"dregs/equilibrium"
	"dregs/recipe"
)

func runUndissolved(p *Pass) {
	for _, s := range p.Trace.Steps {
		if s.After == nil || s.Charged == nil || s.Source != nil && s.Source.Kind == recipe.Seed {
			continue
		}
		for _, u := range s.Undissolved {
			if p.planned(u.Phase, s) || s.After.SolutionL <= 0 {
				continue
			}
			f := p.ofSolid(u.Phase, u.Mol, s.After)
			f.Index, f.Uncertainty, f.Probability = math.NaN(), math.NaN(), math.NaN()
			f.Message = fmt.Sprintf("%s does not all dissolve: %s (%s) is left at %.0f °C", s.Charged.Name, mass(u.Kg*1000), perLitre(f.AmountGPerL), s.After.TempK-equilibrium.ZeroCelsius)
			if !math.IsNaN(u.LeastWaterKg) && u.LeastWaterKg > 0 {
				f.Remedies = append(f.Remedies, Remedy{fmt.Sprintf("%s kg more water at this temperature dissolves it", digits(u.LeastWaterKg*1.005)), true})
			}
			if !math.IsNaN(u.LeastTempK) && u.LeastTempK > s.After.TempK {
				f.Remedies = append(f.Remedies, Remedy{fmt.Sprintf("at %.0f °C it dissolves in the water that is there", math.Ceil(u.LeastTempK-equilibrium.ZeroCelsius+0.5)), true})
			}
			p.byAmount(&f)
			p.Report(s, f)
		}
	}
}

// runNearLimit tells a charge that dissolves with less to spare than the weighing
// tolerance and the constant's uncertainty.
func runNearLimit(p *Pass) {
	for _, s := range p.Trace.Steps {
		if s.After == nil || s.Charged == nil || s.Source == nil || s.Source.Kind == recipe.Seed || len(s.Undissolved) > 0 {
			continue
		}
		tolerance := p.Thresholds.DissolveMargin
		if a := s.Source.Amount; a != nil && a.Value > 0 {
			tolerance = math.Max(tolerance, a.Plus/a.Value)
		}
		for _, phase := range s.Charged.SolidPhases {
			ph := p.Trace.System.Phases[phase]
			if !verySoluble(ph, s.After.TempK) || molOf(s.After, phase) > 0 {
				continue
			}
			ions := 0.0
			for _, part := range ph.Parts {
				if part.Component != "H2O" {
					ions += math.Abs(part.Coefficient)
				}
			}
			index := s.After.State.Index[phase]
			ratio := math.Pow(10, index/ions) // about the fraction of its solubility
			if math.IsInf(index, 0) || ratio < 1-tolerance {
				continue
			}
			f := p.ofSolid(phase, 0, s.After)
			f.Index = index
			f.AmountG, f.AmountGPerL, f.Limits = math.NaN(), math.NaN(), nil
			f.Uncertainty = p.Trace.System.IndexUncertainty(s.After.State, phase)
			f.Probability = normal(index / f.Uncertainty)
			f.Message = fmt.Sprintf("%s just dissolves: the liquor is at %.0f %% of what it can hold at %.0f °C, and the amount may be %.1f %% higher", s.Charged.Name, 100*ratio, s.After.TempK-equilibrium.ZeroCelsius, 100*tolerance)
			p.Report(s, f)
		}
	}
}
