package checks

import (
	"fmt"

	"dregs/equilibrium"
	"dregs/recipe"
)

func runOverfill(p *Pass) {
	full := map[*recipe.Tank]bool{}
	for _, s := range p.Trace.Steps {
		if s.Tank != nil && s.Tank.Capacity != nil && s.After != nil && !full[s.Tank] && s.HighestVolumeL > s.Tank.Capacity.Value {
			full[s.Tank] = true
			p.overfill(s.Tank, s.HighestVolumeL, s.Index)
		}
		if s.Into != nil && s.Into.Capacity != nil && s.IntoAfter != nil && !full[s.Into] && s.IntoAfter.VolumeL > s.Into.Capacity.Value {
			full[s.Into] = true
			p.overfill(s.Into, s.IntoAfter.VolumeL, s.Index)
		}
	}
}

func (p *Pass) overfill(t *recipe.Tank, volumeL float64, index int) {
	f := blank()
	f.Tank = t.Name
	f.Message = fmt.Sprintf("tank %q overfills: %.0f L in %.0f L", t.Name, volumeL, t.Capacity.Value)
	p.Report(p.Trace.Steps[index], f)
}

// runLow tells a tank drawn dry, or stirred below what the stirrer needs.
func runLow(p *Pass) {
	told := map[*recipe.Tank]bool{}
	for _, s := range p.Trace.Steps {
		if s.ShortByL > 0.001 {
			f := blank()
			f.Level = recipe.Stop
			f.Message = fmt.Sprintf("tank %q holds %.0f L less than is taken out", s.Tank.Name, s.ShortByL)
			p.Report(s, f)
		}
		if s.Source == nil || s.After == nil || s.Tank.LeastFill == nil || told[s.Tank] {
			continue
		}
		switch s.Source.Kind {
		case recipe.Dose, recipe.Heat, recipe.Cool, recipe.Adjust, recipe.Hold, recipe.Age, recipe.Together, recipe.Seed:
			if s.After.VolumeL < s.Tank.LeastFill.Value {
				told[s.Tank] = true
				f := blank()
				f.Message = fmt.Sprintf("the stirrer of tank %q needs %.0f L, there are %.0f L", s.Tank.Name, s.Tank.LeastFill.Value, s.After.VolumeL)
				p.Report(s, f)
			}
		}
	}
}

func runRating(p *Pass) {
	told := map[*recipe.Tank]bool{}
	for _, s := range p.Trace.Steps {
		if s.After == nil || s.Tank == nil || told[s.Tank] || s.After.MassKg <= 0 {
			continue
		}
		c := s.After.TempK - equilibrium.ZeroCelsius
		low, high := s.Tank.RatingLow, s.Tank.RatingHigh
		if low != nil && s.After.TempK < low.Value-0.05 || high != nil && s.After.TempK > high.Value+0.05 {
			told[s.Tank] = true
			f := blank()
			f.Message = fmt.Sprintf("tank %q is at %.0f °C, outside its rating", s.Tank.Name, c)
			if low != nil && high != nil {
				f.Message += fmt.Sprintf(" of %.0f to %.0f °C", low.Value-equilibrium.ZeroCelsius, high.Value-equilibrium.ZeroCelsius)
			}
			p.Report(s, f)
		}
	}
}
