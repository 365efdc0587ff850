package checks

import (
	"fmt"
	"math"
	"sort"
	"strings"

	"dregs/equilibrium"
	"dregs/recipe"
	"dregs/recipe/trace"
)

// blank is a finding without numbers.
func blank() Finding {
	n := math.NaN()
	return Finding{AmountG: n, AmountGPerL: n, Index: n, Uncertainty: n, Probability: n, Onset: n}
}

// ofSolid fills in what a solid brings: names, amount, index before it came down,
// its uncertainty, the probability that it is oversaturated, what limits it and
// what the figures rest on.
func (p *Pass) ofSolid(phase int, mol float64, l *trace.Liquor) Finding {
	f := blank()
	sys := p.Trace.System
	ph := sys.Phases[phase]
	f.Phase, f.Formula = ph.Name, ph.Formula
	f.AmountG = mol * ph.MolarMass
	if l.SolutionL > 0 {
		f.AmountGPerL = f.AmountG / l.VolumeL // of the batch, solids included
	}
	// Where the solid stood before, the liquor was in balance with it: there is no
	// index of a clear liquor.
	if l.Clear != nil && l.Clear.SolidMol[phase] == 0 {
		f.Index = l.Clear.Index[phase]
		f.Uncertainty = sys.IndexUncertainty(l.Clear, phase)
		f.Probability = normal(f.Index / f.Uncertainty)
	}
	f.Limits = p.limits(phase, mol, l)
	f.Evidence = p.evidence(phase, l.Clear)
	return f
}

// normal is the cumulative normal distribution.
func normal(x float64) float64 { return 0.5 * math.Erfc(-x/math.Sqrt2) }

// limits names the components of which most went into the solid.
func (p *Pass) limits(phase int, mol float64, l *trace.Liquor) []string {
	sys := p.Trace.System
	type share struct {
		name string
		part float64
	}
	var shares []share
	for _, part := range sys.Phases[phase].Parts {
		i := sys.Index(part.Component)
		if part.Component == "H2O" || part.Component == "H^+" || i < 0 || part.Coefficient <= 0 {
			continue
		}
		if total := l.Totals[i]; total > 0 {
			shares = append(shares, share{part.Component, mol * part.Coefficient / total})
		}
	}
	sort.SliceStable(shares, func(i, j int) bool { return shares[i].part > shares[j].part })
	var out []string
	for _, s := range shares {
		if len(out) == 3 {
			break
		}
		out = append(out, fmt.Sprintf("%s, of which %s comes down", Ion(s.name), percent(s.part)))
	}
	return out
}

func percent(part float64) string {
	switch {
	case part > 0.9995:
		return "all"
	case part >= 0.1:
		return fmt.Sprintf("%.0f %%", 100*part)
	}
	return fmt.Sprintf("%.2g %%", 100*part)
}

// evidence says what the figures rest on.
func (p *Pass) evidence(phase int, st *equilibrium.State) []string {
	sys := p.Trace.System
	var out []string
	model := sys.ModelName()
	if st != nil {
		if inside, reason := sys.ModelRange(st); !inside {
			model += "; outside it: " + reason
		}
	}
	out = append(out, model)
	ph := sys.Phases[phase]
	k := fmt.Sprintf("%s: log K %.2f ± %.2f at 25 °C, %.0f to %.0f °C, %s", ph.Name, ph.LogK.At(298.15), ph.LogK.Uncertainty, ph.LogK.MinC, ph.LogK.MaxC, ph.Source)
	if ph.FromMemory {
		k += " (from memory)"
	}
	if st != nil && !ph.LogK.InRange(st.TempK) {
		k += fmt.Sprintf("; used at %.0f °C, outside its range", st.TempK-equilibrium.ZeroCelsius)
	}
	return append(out, k)
}

// planned tells whether the recipe expects the phase in the stage of the step or
// in one before it.
func (p *Pass) planned(phase int, s *trace.Step) bool {
	if s.Stage == nil {
		return false
	}
	for _, stage := range p.Trace.Recipe.Stages {
		for _, e := range stage.Steps {
			if e.Kind == recipe.Expect && p.isPhase(e.What, phase) {
				return true
			}
		}
		if stage == s.Stage {
			break
		}
	}
	return false
}

// isPhase tells whether a name as written means the phase.
func (p *Pass) isPhase(name string, phase int) bool {
	ph := p.Trace.System.Phases[phase]
	if name == ph.Name || name == ph.Formula {
		return true
	}
	found, ok := p.Trace.System.Database.LookupPhase(name)
	if ok && found == ph {
		return true
	}
	for _, other := range p.Trace.System.Database.PhasesOf(name) {
		if other == ph {
			return true
		}
	}
	return false
}

// ofCharge tells whether the phase is what the step charges.
func ofCharge(s *trace.Step, phase int) bool {
	if s.Charged == nil {
		return false
	}
	for _, p := range s.Charged.SolidPhases {
		if p == phase {
			return true
		}
	}
	return false
}

// molOf is how much of a phase stands in a liquor.
func molOf(l *trace.Liquor, phase int) float64 {
	if l == nil {
		return 0
	}
	for _, s := range l.Solids {
		if s.Phase == phase {
			return s.Mol
		}
	}
	return 0
}

// sameSalt tells whether two phases differ by water of crystallisation or form
// only.
func (p *Pass) sameSalt(a, b int) bool {
	if a == b {
		return false
	}
	one, two := p.Trace.System.Phases[a].Parts, p.Trace.System.Phases[b].Parts
	count := func(parts []equilibrium.Part) map[string]float64 {
		m := map[string]float64{}
		for _, part := range parts {
			if part.Component != "H2O" {
				m[part.Component] += part.Coefficient
			}
		}
		return m
	}
	x, y := count(one), count(two)
	if len(x) != len(y) {
		return false
	}
	for name, n := range x {
		if y[name] != n {
			return false
		}
	}
	return true
}

// verySoluble tells salts of more than about 1 mol/kg from sparingly soluble ones
// by their constant, per ion.
func verySoluble(ph *equilibrium.Phase, tempK float64) bool {
	ions := 0.0
	for _, part := range ph.Parts {
		if part.Component != "H2O" {
			ions += math.Abs(part.Coefficient)
		}
	}
	return ions > 0 && ph.LogK.At(tempK)/ions > -1.2
}

// kg writes a mass in the unit that suits it.
func mass(g float64) string {
	switch a := math.Abs(g); {
	case a >= 1e6:
		return fmt.Sprintf("%.3g t", g/1e6)
	case a >= 1000:
		return fmt.Sprintf("%s kg", digits(g/1000))
	case a >= 1:
		return fmt.Sprintf("%s g", digits(g))
	}
	return fmt.Sprintf("%.2g mg", g*1000)
}

func digits(v float64) string {
	switch a := math.Abs(v); {
	case a >= 100:
		return fmt.Sprintf("%.0f", v)
	case a >= 10:
		return fmt.Sprintf("%.1f", v)
	}
	return fmt.Sprintf("%.2f", v)
}

func perLitre(gPerL float64) string {
	if gPerL < 0.1 {
		return fmt.Sprintf("%.2g mg/L", gPerL*1000)
	}
	return digits(gPerL) + " g/L"
}

var lowered = strings.NewReplacer("0", "₀", "1", "₁", "2", "₂", "3", "₃", "4", "₄", "5", "₅", "6", "₆", "7", "₇", "8", "₈", "9", "₉")

// Ion writes SO4^2- as SO₄²⁻.
func Ion(name string) string {
	name = strings.TrimSuffix(name, "(aq)")
	at := strings.IndexByte(name, '^')
	if at < 0 {
		return lowered.Replace(name)
	}
	return lowered.Replace(name[:at]) + strings.NewReplacer("0", "⁰", "1", "¹", "2", "²", "3", "³", "4", "⁴", "5", "⁵", "6", "⁶", "7", "⁷", "8", "⁸", "9", "⁹", "+", "⁺", "-", "⁻").Replace(name[at+1:])
}

// byAmount takes the level of a solid down: a trace is a note, a bloom that filters
// off no stop.
func (p *Pass) byAmount(f *Finding) {
	level := f.Level
	if level == 0 {
		level = p.Rule.Level
	}
	switch {
	case f.AmountGPerL < p.Thresholds.HazeGPerL:
		f.Level = recipe.Note
	case f.AmountGPerL < p.Thresholds.BloomGPerL && level == recipe.Stop:
		f.Level = recipe.Caution
	}
}
