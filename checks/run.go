package checks

import (
	"sort"

	"dregs/recipe"
	"dregs/recipe/trace"
)

// Run applies every rule to a trace. Problems that leave the recipe usable become
// findings. The order is that of the recipe. A nil t is the standard ruleset.
func Run(tr *trace.Trace, problems []recipe.Problem, t *Thresholds) []Finding {
	if t == nil {
		t = Standard()
	}
	var out []Finding
	for _, rule := range All {
		p := &Pass{Rule: rule, Trace: tr, Thresholds: t}
		rule.Run(p)
		out = append(out, p.findings...)
	}
	for _, problem := range problems {
		if !problem.Fatal {
			out = append(out, ofProblem(tr, problem))
		}
	}
	for i := range out {
		out[i].Level = t.level(&out[i])
	}
	waive(tr, out)
	out = append(out, unusedWaivers(tr)...)
	sort.SliceStable(out, func(i, j int) bool {
		a, b := &out[i], &out[j]
		switch {
		case a.order != b.order:
			return a.order < b.order
		case a.At.Line != b.At.Line:
			return a.At.Line < b.At.Line
		case a.Level != b.Level:
			return a.Level > b.Level
		case a.Code != b.Code:
			return a.Code < b.Code
		}
		return a.Phase < b.Phase
	})
	return out
}

func ofProblem(tr *trace.Trace, problem recipe.Problem) Finding {
	f := blank()
	f.Code, f.Level, f.Message, f.At, f.Recipe = problem.Code, problem.Level, problem.Message, problem.At, tr.Recipe.Name
	if problem.Expected != "" {
		f.Message += "; expected " + problem.Expected
	}
	return f
}

// waive marks findings that a waiver of their step, stage or recipe accepts.
func waive(tr *trace.Trace, findings []Finding) {
	for i := range findings {
		f := &findings[i]
		lists := [][]*recipe.Waiver{tr.Recipe.Waivers}
		if f.step != nil {
			if f.step.Stage != nil {
				lists = append(lists, f.step.Stage.Waivers)
			}
			if f.step.Source != nil {
				lists = append(lists, f.step.Source.Waivers)
			}
		}
		for _, list := range lists {
			for _, w := range list {
				if w.Code == f.Code && covers(tr, w, f) && !w.Expired {
					w.Used = true
					f.Waived = w
				}
			}
		}
	}
}

// covers tells whether a waiver is of the solid of a finding, whichever of its
// names it uses.
func covers(tr *trace.Trace, w *recipe.Waiver, f *Finding) bool {
	if w.Phase == "" || w.Phase == f.Phase || w.Phase == f.Formula {
		return true
	}
	ph, ok := tr.System.Database.LookupPhase(w.Phase)
	return ok && ph.Name == f.Phase
}

func unusedWaivers(tr *trace.Trace) []Finding {
	var out []Finding
	tell := func(list []*recipe.Waiver) {
		for _, w := range list {
			if !w.Used && !w.Expired {
				out = append(out, ofProblem(tr, recipe.Problem{Code: "RCP-07", Level: recipe.Note, Message: "the waiver of " + w.Code + " waived nothing", At: w.At}))
			}
		}
	}
	tell(tr.Recipe.Waivers)
	for _, stage := range tr.Recipe.Stages {
		tell(stage.Waivers)
		for _, s := range stage.Steps {
			tell(s.Waivers)
		}
	}
	return out
}

// Worst is the highest level of findings that are not waived, 0 for none.
func Worst(findings []Finding) recipe.Level {
	worst := recipe.Level(0)
	for _, f := range findings {
		if f.Waived == nil && f.Level > worst {
			worst = f.Level
		}
	}
	return worst
}
