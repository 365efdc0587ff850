package checks

import (
	"dregs/recipe"
	"dregs/recipe/trace"
)

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
	Limits      []string // what limits the amount, e.g. "SO₄²⁻ (98 % of it comes down)"
	Evidence    []string // lines: model and its range, constants with source
	Remedies    []Remedy
	Waived      *recipe.Waiver
}

// Remedy is a way out; Verified says that the walk was run again with it and the
// finding was gone. Unverified ones are never printed.
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
	report     func(Finding)
}

// Report adds a finding; code, recipe and level are filled in when empty.
func (p *Pass) Report(f Finding) {
	p.report(f)
}

// Thresholds are limits that a ruleset sets.
type Thresholds struct {
	HazeGPerL float64 // solid below this is a note
}
