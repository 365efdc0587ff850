package main

import (
	"math"
	"sort"
	"strings"

	"dregs/equilibrium"
	"dregs/recipe/trace"
)

// near is a solid that is not there, and how far the liquor is from it.
type near struct {
	name, formula      string
	index, uncertainty float64
	slow               bool
}

// Saturation indices below which a solid is of no interest to a reader of a
// screen; programs get all of them.
const (
	farthest     = -4
	farthestSlow = -0.5
)

// closest lists the solids nearest to saturation that are not there, the nearest
// first: those that form readily, then, marked, slow ones near saturation.
func closest(sys *equilibrium.System, l *trace.Liquor, most int) []near {
	if l == nil || l.State == nil || l.State.WaterKg <= 0 {
		return nil
	}
	ready := make([]bool, len(sys.Phases))
	sys.Ready(l.TempK, ready)
	var out []near
	for p, phase := range sys.Phases {
		index := l.State.Index[p]
		if l.State.SolidMol[p] > 0 || math.IsInf(index, 0) || index < farthest || !ready[p] && index < farthestSlow {
			continue
		}
		out = append(out, near{phase.Name, phase.Formula, index, sys.IndexUncertainty(l.State, p), !ready[p]})
	}
	sort.SliceStable(out, func(i, j int) bool {
		if out[i].slow != out[j].slow {
			return out[j].slow
		}
		return out[i].index > out[j].index
	})
	if len(out) > most {
		out = out[:most]
	}
	return out
}

func nearText(list []near) string {
	var parts []string
	for _, n := range list {
		text := n.name + " " + indexText(n.index, n.uncertainty)
		if n.slow {
			text += " (slow)"
		}
		parts = append(parts, strings.ReplaceAll(text, " ", glue))
	}
	return strings.Join(parts, ", ")
}
