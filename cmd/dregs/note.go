package main

import (
	"fmt"
	"math"
	"os"
	"strings"

	"dregs/checks"
	"dregs/equilibrium"
	"dregs/recipe"
	"dregs/recipe/trace"
)

// stepNote is what the screen says of a step beside its findings.
type stepNote struct {
	text  string // the step as written
	tank  string
	state string // of the tank after it
}

// note keeps of the trace what the screens of check need.
func (v *verdict) note() {
	v.model = v.trace.System.ModelName()
	v.closest = closestOfAll(v.trace)
	v.steps = map[recipe.Range]stepNote{}
	var source []string
	for _, f := range v.findings {
		if s := stepOf(v.trace, f); s != nil {
			v.steps[f.At] = stepNote{text: writtenStep(s), tank: s.Tank.Name, state: stateText(s.After)}
			continue
		}
		if f.At.File != v.file || f.At.Line == 0 {
			continue
		}
		if source == nil {
			source = v.sourceLines()
		}
		if f.At.Line <= len(source) {
			v.steps[f.At] = stepNote{text: withoutRemark(source[f.At.Line-1])}
		}
	}
}

// sourceLines are the lines of the recipe, for findings that belong to no step.
func (v *verdict) sourceLines() []string {
	text := v.input
	if text == nil {
		text, _ = os.ReadFile(v.file)
	}
	return strings.Split(string(text), "\n")
}

// withoutRemark is a line of a recipe without its remark and margins.
func withoutRemark(line string) string {
	if text, remark, ok := strings.Cut(line, " #"); ok && !strings.Contains(remark, "\"") {
		line = text
	}
	return strings.Join(strings.Fields(line), " ")
}

// stepOf finds the step that a finding belongs to: the one at its very place, or
// the last one before it in the same stage.
func stepOf(tr *trace.Trace, f checks.Finding) *trace.Step {
	var best *trace.Step
	for _, s := range tr.Steps {
		if s.At == f.At && s.Tank != nil {
			return s
		}
	}
	if f.Stage == "" {
		return nil
	}
	for _, s := range tr.Steps {
		stage := ""
		if s.Stage != nil {
			stage = s.Stage.Name
		}
		if stage != f.Stage || s.At.File != f.At.File || s.At.Byte > f.At.Byte || s.Tank == nil {
			continue
		}
		if best == nil || s.At.Byte > best.At.Byte {
			best = s
		}
	}
	return best
}

// writtenStep is the step as it stands in the file; a heel has no step there.
func writtenStep(s *trace.Step) string {
	if s.Source == nil {
		return s.What
	}
	return stepText(s.Source)
}

// stateText is a liquor in one line.
func stateText(l *trace.Liquor) string {
	if l == nil || l.State == nil {
		return ""
	}
	if l.State.WaterKg <= 0 {
		return fmt.Sprintf("%s kg, no liquid", figures(l.MassKg, 4))
	}
	text := fmt.Sprintf("%s, %s °C, pH %s, ionic strength %s mol/kg", volumeText(l.VolumeL), fixed(l.TempK-equilibrium.ZeroCelsius, 1), fixed(l.State.PH, 2), ionicText(l.State.IonicStrength))
	if kg := solidsKg(l); kg > 0 {
		text += ", solids " + massText(1000*kg)
	}
	return text
}

func volumeText(volumeL float64) string {
	if volumeL > 0 && volumeL < 1 {
		return figures(1000*volumeL, 4) + " mL"
	}
	return figures(volumeL, 4) + " L"
}

func solidsKg(l *trace.Liquor) float64 {
	sum := 0.0
	for _, s := range l.Solids {
		sum += s.Kg
	}
	return sum
}

// closestOfAll names the solid that comes nearest to saturation anywhere in the
// recipe without being there.
func closestOfAll(tr *trace.Trace) string {
	best, text := math.Inf(-1), ""
	for _, s := range tr.Steps {
		for _, p := range closest(tr.System, s.After, 1) {
			if p.index > best {
				best = p.index
				text = fmt.Sprintf("%s %s at line %d", p.name, indexText(p.index, p.uncertainty), s.At.Line)
			}
		}
	}
	return text
}
