package trace

import (
	"fmt"

	"dregs/equilibrium"
	"dregs/recipe"
)

// deepest bounds liquors taken from recipes that take liquors from recipes.
const deepest = 8

// mostRepeats bounds the batches of one recipe that are walked.
const mostRepeats = 100

type walker struct {
	tr     *Trace
	recipe *recipe.Recipe
	db     *equilibrium.Database
	sys    *equilibrium.System
	solver *equilibrium.Solver
	depth  int

	tanks  map[*recipe.Tank]*Liquor
	failed map[*recipe.Tank]bool
	minute float64
	at     recipe.Range // of the step being walked

	stage  *recipe.Stage
	last   map[*recipe.Step]bool // the last step of its stage in its tank
	molar  []float64             // kg/mol by component
	allow  []bool                // workspace
	gasBar []float64             // workspace
	gas    []gasPath             // by gas of the system
	lost   []float64             // mol by component that left all tanks, gas included
}

// walk is Walk with its inside: the tanks as they end, and what left them.
func walk(r *recipe.Recipe, o Options, depth int) *walker {
	w := &walker{tr: &Trace{Recipe: r, Materials: map[string]*Charged{}}, recipe: r, depth: depth,
		tanks: map[*recipe.Tank]*Liquor{}, failed: map[*recipe.Tank]bool{}, last: map[*recipe.Step]bool{}}
	w.db = o.Database
	if w.db == nil {
		w.db = equilibrium.Default()
	}
	w.own()
	if !w.resolve() {
		return w
	}
	for _, tank := range r.Tanks {
		w.tanks[tank] = w.empty(roomK)
		if h := tank.Heel; h != nil {
			w.heel(tank, h)
		}
	}
	w.markLast()
	repeat := max(r.Repeat, 1)
	if repeat > mostRepeats {
		w.missing(r.Name, fmt.Sprintf("repeated %d times; the first %d batches are computed", repeat, mostRepeats), r.At)
		repeat = mostRepeats
	}
	for range repeat {
		for _, stage := range r.Stages {
			w.stage = stage
			for _, s := range stage.Steps {
				w.step(s)
			}
		}
	}
	return w
}

// markLast finds the last step of every stage in each of its tanks: there the
// liquor may stand, cool and meet the air.
func (w *walker) markLast() {
	for _, stage := range w.recipe.Stages {
		seen := map[*recipe.Tank]bool{}
		for i := len(stage.Steps) - 1; i >= 0; i-- {
			s := stage.Steps[i]
			if s.Kind != recipe.Expect && !seen[s.Tank] {
				seen[s.Tank], w.last[s] = true, true
			}
		}
	}
}

func (w *walker) missing(what, why string, at recipe.Range) {
	for _, m := range w.tr.Missing {
		if m.What == what && m.Why == why {
			return
		}
	}
	w.tr.Missing = append(w.tr.Missing, Missing{What: what, Why: why, At: at})
}

// blind is missing for what leaves part of the chemistry out.
func (w *walker) blind(what, why string, at recipe.Range) {
	w.missing(what, why, at)
	for i := range w.tr.Missing {
		if m := &w.tr.Missing[i]; m.What == what && m.Why == why {
			m.Blind = true
		}
	}
}

// Codes of what the walk cannot use; they belong to the recipe as text.
const (
	codeUnknown    = "RCP-02" // a name, formula or element that nothing is known of
	codeImpossible = "RCP-05" // an amount that cannot be
	codeUnsolved   = "RCP-10" // no equilibrium was found
)

func (w *walker) problem(code string, fatal bool, at recipe.Range, expected, format string, args ...any) {
	p := recipe.Problem{Code: code, Level: recipe.Stop, Fatal: fatal, Message: fmt.Sprintf(format, args...), Expected: expected, At: at}
	for _, old := range w.tr.Problems {
		if old.Message == p.Message && old.At == p.At {
			return
		}
	}
	w.tr.Problems = append(w.tr.Problems, p)
}

// heel is a charge before the first stage.
func (w *walker) heel(tank *recipe.Tank, h *recipe.Step) {
	out := w.begin(h, tank)
	out.Source, out.Stage = nil, nil
	out.What = "heel " + h.What
	w.charge(out, h)
	w.end(out, h)
}
