package main

import (
	"cmp"
	"fmt"
	"io"
	"os"
	"slices"
	"strconv"
	"strings"
	"time"

	"dregs/checks"
	"dregs/recipe"
	"dregs/recipe/trace"
)

// verdict is what was found out about one recipe.
type verdict struct {
	file     string         // as on screens
	title    string         // the recipe's name, "" when it could not be read
	head     string         // revision and batch
	recipe   *recipe.Recipe // nil once closed
	trace    *trace.Trace   // nil once closed
	findings []checks.Finding
	faults   []recipe.Problem // that make the recipe unusable
	advice   []recipe.Problem // the other problems of the text
	model    string           // of the activity coefficients
	closest  string           // the solid nearest to coming down, over all steps
	steps    map[recipe.Range]stepNote
	input    []byte // what standard input held
}

func (v *verdict) usable() bool { return len(v.faults) == 0 }

func (v *verdict) worst() recipe.Level { return checks.Worst(v.findings) }

// name is the recipe's own, or its file.
func (v *verdict) name() string {
	if v.title != "" {
		return v.title
	}
	if v.file == "-" {
		return "standard input"
	}
	return v.file
}

// close lets go of recipe and trace, which thousands of verdicts could not keep.
// Findings hold on to their step, so they are copied without it.
func (v *verdict) close() {
	v.recipe, v.trace, v.advice, v.input = nil, nil, nil, nil
	for i, f := range v.findings {
		v.findings[i] = checks.Finding{Code: f.Code, Level: f.Level, Message: f.Message, Recipe: f.Recipe, Stage: f.Stage, Step: f.Step, Tank: f.Tank, At: f.At,
			Phase: f.Phase, Formula: f.Formula, AmountG: f.AmountG, AmountGPerL: f.AmountGPerL, Index: f.Index, Uncertainty: f.Uncertainty,
			Probability: f.Probability, Onset: f.Onset, Limits: f.Limits, Evidence: f.Evidence, Remedies: f.Remedies, Waived: f.Waived}
	}
}

const mostInput = 1 << 20 // bytes of a recipe, as package recipe has it

// readInput reads a recipe from standard input, a little more than is allowed so
// that the reader tells what is too much.
func (c *call) readInput() ([]byte, error) {
	return io.ReadAll(io.LimitReader(c.in, mostInput+1))
}

// load reads one recipe and has it walked. Faults stop before the walk.
func (c *call) load(path string, o recipe.Options) *verdict {
	v := &verdict{file: path}
	var problems []recipe.Problem
	if path == "-" {
		text, err := c.readInput()
		if err != nil {
			v.faults = []recipe.Problem{{Code: "RCP-01", Level: recipe.Stop, Fatal: true, Message: "standard input cannot be read", At: recipe.Range{File: path}}}
			return v
		}
		v.input = text
		v.recipe, problems = recipe.LoadBytes(path, text, o)
	} else {
		v.recipe, problems = recipe.Load(path, o)
	}
	if v.recipe != nil && !anyFatal(problems) {
		v.trace = trace.Walk(v.recipe, trace.Options{})
		problems = append(problems, v.trace.Problems...)
	}
	if v.recipe != nil {
		v.title, v.head = v.recipe.Name, headText(v.recipe)
	}
	for _, p := range problems {
		if p.Fatal {
			v.faults = append(v.faults, p)
		} else {
			p.Message, p.Expected, p.Nearest = problemText(p), "", ""
			v.advice = append(v.advice, p)
		}
	}
	slices.SortStableFunc(v.faults, func(a, b recipe.Problem) int {
		return cmp.Or(cmp.Compare(a.At.File, b.At.File), cmp.Compare(a.At.Line, b.At.Line), cmp.Compare(a.At.Column, b.At.Column))
	})
	return v
}

func anyFatal(problems []recipe.Problem) bool {
	for _, p := range problems {
		if p.Fatal {
			return true
		}
	}
	return false
}

// problemText is a problem as one sentence.
func problemText(p recipe.Problem) string {
	text := p.Message
	if p.Expected != "" {
		text += "; expected " + p.Expected
	}
	if p.Nearest != "" {
		text += "; the nearest is " + strconv.Quote(p.Nearest)
	}
	return text
}

// options of reading, with what --set gave.
func readOptions(set []string) (recipe.Options, error) {
	o := recipe.Options{
		Set: map[string]string{}, KnownSubstance: knownSubstance, KnownPhase: knownPhase,
		Substances: substanceNames, Phases: phaseNames, KnownRule: knownCode, Rules: checks.Codes,
		Today: today(),
	}
	for _, pair := range set {
		name, value, ok := strings.Cut(pair, "=")
		if !ok || strings.TrimSpace(name) == "" {
			return o, badCallf("option --set does not take %q, expected NAME=VALUE", pair)
		}
		o.Set[strings.TrimSpace(name)] = strings.TrimSpace(value)
	}
	return o, nil
}

// today decides which waivers have passed. SOURCE_DATE_EPOCH, when set, takes the
// place of the clock.
func today() time.Time {
	if seconds, err := strconv.ParseInt(os.Getenv("SOURCE_DATE_EPOCH"), 10, 64); err == nil {
		return time.Unix(seconds, 0).UTC()
	}
	return time.Now()
}

// tellFaults writes what makes a recipe unusable to the fault stream: for people,
// or in the GNU error location form.
func (c *call) tellFaults(v *verdict, asLines bool) {
	for _, p := range v.faults {
		c.code = exitUnusable
		text := fmt.Sprintf("dregs: %s, line %d, column %d: %s (%s)", p.At.File, p.At.Line, p.At.Column, problemText(p), p.Code)
		switch {
		case p.At.Line == 0:
			text = fmt.Sprintf("dregs: %s: %s (%s)", v.file, problemText(p), p.Code)
		case asLines:
			text = fmt.Sprintf("%s: fault: %s [%s]", location(p.At), problemText(p), p.Code)
		}
		fmt.Fprintln(c.fault, printable(text))
	}
}

// location is the GNU error location form.
func location(at recipe.Range) string {
	return fmt.Sprintf("%s:%d:%d", at.File, at.Line, at.Column)
}
