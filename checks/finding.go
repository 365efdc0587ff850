package checks

import (
	"dregs/recipe"
	"dregs/recipe/trace"
)

// Caution ends every screen and file.
const Caution = "This is a calculation, not a safety review. Before anything is charged, follow the site's safety procedures, local codes and the judgement of licensed practice."

// Finding is data; renderers choose words and width.
type Finding struct {
	Code    string
	Level   recipe.Level
	Message string // one sentence, plain text, ions as on screens
	Recipe  string
	Stage   string
	Step    string
	Tank    string
	At      recipe.Range

	Phase       string // mineral name, "" when the finding is not of a solid
	Formula     string
	AmountG     float64 // NaN when it has none
	AmountGPerL float64
	Index       float64  // saturation index before any solid, NaN
	Uncertainty float64  // of the index
	Probability float64  // 0..1, NaN
	Onset       float64  // fraction of the step, NaN until it is computed
	Limits      []string // what limits the amount
	Evidence    []string // model and its range, constants with source
	Remedies    []Remedy
	Waived      *recipe.Waiver

	step  *trace.Step // where it is, for waivers and order; nil for the recipe
	order int
}

// Remedy is a way out; Verified says that the walk was run again with it, or the
// equilibrium solved with it, and the finding was gone. Unverified ones are never
// printed.
type Remedy struct {
	Text     string
	Verified bool
}

// Rule is a checker: a value, not a type.
type Rule struct {
	Code  string
	Title string
	Text  string       // what it means, how it is computed, what to do, when it is wrong
	Level recipe.Level // usual level
	Run   func(*Pass)
}

// Pass is one run of one rule over one trace.
type Pass struct {
	Rule       *Rule
	Trace      *trace.Trace
	Thresholds *Thresholds
	findings   []Finding
}

// Report adds a finding; what the step and the phase say is filled in.
func (p *Pass) Report(s *trace.Step, f Finding) {
	if f.Code == "" {
		f.Code = p.Rule.Code
	}
	if f.Level == 0 {
		f.Level = p.Rule.Level
	}
	f.Recipe = p.Trace.Recipe.Name
	f.step = s
	if s != nil {
		f.order = s.Index
		f.Step = s.What
		if s.Stage != nil {
			f.Stage = s.Stage.Name
		}
		if f.Tank == "" && s.Tank != nil {
			f.Tank = s.Tank.Name
		}
		if f.At.Line == 0 {
			f.At = s.At
		}
	} else if f.At.Line == 0 {
		f.At = p.Trace.Recipe.At
	}
	p.findings = append(p.findings, f)
}
