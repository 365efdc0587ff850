package trace

import (
	"fmt"

	"dregs/equilibrium"
)

// feedFractions are the mixtures looked at: close where the feed is a trace and
// where it is nearly all, as at the end of a feed pipe.
var feedFractions = [...]float64{0.001, 0.003, 0.01, 0.03, 0.1, 0.2, 0.35, 0.5, 0.65, 0.8, 0.9, 0.97}

// feed computes the mixing line of a liquid that enters at a feed point.
func (w *walker) feed(out *Step, bulk *Liquor) {
	c := out.Charged
	if c == nil || !c.liquid || !bulk.wet() || !(c.DensityKgL > 0) {
		return
	}
	perL := make([]float64, len(w.sys.Components))
	for _, p := range c.Parts {
		perL[w.sys.Index(p.Component)] += p.Coefficient * c.DensityKgL
	}
	out.Feed = w.mixingLine(bulk, perL, 1)
}

// mixingLine mixes a feed with what is dissolved in the bulk, at the bulk's
// temperature, by volume; nothing comes down. Mixtures that cannot be computed
// are told as missing.
func (w *walker) mixingLine(bulk *Liquor, feed []float64, feedL float64) *FeedLine {
	dissolved := w.dissolved(bulk)
	totals := make([]float64, len(dissolved))
	st := w.sys.NewState()
	st.CopyFrom(bulk.State)
	c := equilibrium.Conditions{TempK: bulk.TempK, Allowed: make([]bool, len(w.sys.Phases))}
	line := &FeedLine{}
	for _, f := range feedFractions {
		for i := range totals {
			totals[i] = (1-f)*dissolved[i]/bulk.SolutionL + f*feed[i]/feedL
			if totals[i] < 0 && i > 1 {
				totals[i] = 0
			}
		}
		if err := w.solver.Solve(totals, &c, st); err != nil {
			w.blind("the mixing line of the feed", fmt.Sprintf("at %.0f %% feed it could not be computed: %v", 100*f, err), w.at)
			continue
		}
		line.Points = append(line.Points, FeedPoint{FeedFraction: f, PH: st.PH, TempK: bulk.TempK, Index: append([]float64{}, st.Index...)})
	}
	return line
}
