package checks

import (
	"fmt"
	"math"

	"dregs/equilibrium"
	"dregs/recipe"
)

// runFeed looks for the phase that is most oversaturated on each mixing line and
// does not stand in the bulk.
func runFeed(p *Pass) {
	for _, s := range p.Trace.Steps {
		if s.Feed == nil || s.After == nil {
			continue
		}
		worst, peak, at, ph := -1, p.Thresholds.FeedIndex, 0.0, 0.0
		for _, point := range s.Feed.Points {
			for i, index := range point.Index {
				phase := p.Trace.System.Phases[i]
				if phase.Forms != equilibrium.FormsFast || math.IsInf(index, 0) || index <= peak || molOf(s.After, i) > 0 || molOf(s.Before, i) > 0 || p.planned(i, s) {
					continue
				}
				worst, peak, at, ph = i, index, point.FeedFraction, point.PH
			}
		}
		if worst < 0 {
			continue
		}
		phase := p.Trace.System.Phases[worst]
		after := s.After.State.Index[worst]
		f := blank()
		f.Phase, f.Formula, f.Index = phase.Name, phase.Formula, peak
		f.Uncertainty = p.Trace.System.IndexUncertainty(s.After.State, worst)
		f.Probability = normal(peak / f.Uncertainty)
		f.Evidence = p.evidence(worst, nil)
		f.Message = fmt.Sprintf("%s may flash out where the feed meets the bulk: saturation index %.1f at %.0f %% feed, pH %.1f; in the bulk it is %.1f", phase.Name, peak, 100*at, ph, after)
		if after < -0.3 || peak < 2*p.Thresholds.FeedIndex {
			f.Message += ", so it dissolves again"
			f.Level = recipe.Note
		}
		p.Report(s, f)
	}
}
