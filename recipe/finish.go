package recipe

import (
	"strings"
	"time"
)

// finish checks what can only be told when everything is read: names of
// materials and phases, and what was defined and never used.
func (r *reader) finish() {
	if r.recipe == nil {
		return
	}
	if r.unread() {
		return
	}
	for _, t := range r.recipe.Tanks {
		if t.Heel != nil && t.Used {
			r.materialNamed(t.Heel.What, t.Heel.WhatAt)
		}
	}
	for _, stage := range r.recipe.Stages {
		for _, s := range stage.Steps {
			r.stepNames(s)
			for _, d := range s.Doses {
				r.stepNames(d)
			}
		}
	}
	for _, s := range r.problems {
		if s.Fatal {
			return
		}
	}
	r.unused()
}

// unread tells whether a file could not be read or used. What follows from that,
// names that it would have defined, is then not told.
func (r *reader) unread() bool {
	missing := false
	for _, p := range r.problems {
		missing = missing || p.Message != furtherProblems && (p.Code == "RCP-01" || p.Code == "RCP-08" || p.Code == "RCP-09")
	}
	if !missing {
		return false
	}
	kept := r.problems[:0]
	for _, p := range r.problems {
		follows := false
		for _, start := range []string{"there is no tank", "there is no phase", "nothing is known of"} {
			follows = follows || strings.HasPrefix(p.Message, start)
		}
		if !follows && !strings.HasSuffix(p.Message, " has no tank") {
			kept = append(kept, p)
		}
	}
	r.problems = kept
	return true
}

func (r *reader) stepNames(s *Step) {
	switch s.Kind {
	case Charge, Dose, Seed, MakeUp:
		if s.What != "" {
			r.materialNamed(s.What, s.WhatAt)
		}
	case Expect:
		if r.o.KnownPhase != nil && !r.o.KnownPhase(s.What) && !r.ownPhase(s.What) && s.What != "" {
			r.problem("RCP-02", s.WhatAt, "a mineral name or a formula", Nearest(s.What, r.phaseNames()), "there is no phase %q", s.What)
		}
	}
	if s.With != "" {
		r.materialNamed(s.With, s.WithAt)
	}
	if s.WashWith != "" {
		r.materialNamed(s.WashWith, s.At)
	}
}

// pureWater needs no water block.
var pureWater = []string{"water", "demineralised water", "demineralized water", "deionised water", "deionized water", "distilled water", "pure water"}

// materialNamed marks what a step uses, and tells a name that nothing defines.
func (r *reader) materialNamed(name string, at Range) {
	names := append([]string{}, pureWater...)
	for _, w := range r.recipe.Waters {
		if w.Name == name {
			w.Used = true
			return
		}
		names = append(names, w.Name)
	}
	for _, m := range r.recipe.Materials {
		if m.Name == name {
			m.Used = true
			return
		}
		names = append(names, m.Name)
	}
	for _, l := range r.recipe.Liquors {
		if l.Name == name {
			l.Used = true
			return
		}
		names = append(names, l.Name)
	}
	if contains(pureWater, strings.ToLower(name)) || r.o.KnownSubstance == nil || r.o.KnownSubstance(name) {
		return
	}
	nearest := Nearest(name, names)
	if nearest == "" && r.o.Substances != nil {
		nearest = Nearest(name, r.o.Substances())
	}
	r.problem("RCP-02", at, "a material or water block, a substance of the catalogue, or a formula", nearest, "nothing is known of %q", name)
}

func (r *reader) ownPhase(name string) bool {
	for _, p := range r.recipe.Phases {
		if p.Name == name || p.Formula == name {
			return true
		}
	}
	return false
}

func (r *reader) phaseNames() []string {
	var names []string
	for _, p := range r.recipe.Phases {
		names = append(names, p.Name)
	}
	if r.o.Phases != nil {
		names = append(names, r.o.Phases()...)
	}
	return names
}

// checkDate tells a waiver whose day has passed.
func (r *reader) checkDate(w *Waiver, at Range) {
	day, err := time.Parse("2006-01-02", w.Until)
	if err != nil {
		r.problem("RCP-03", at, "a day such as \"2027-06-30\"", "", "%q is not a day", w.Until)
		return
	}
	if !r.o.Today.IsZero() && r.o.Today.After(day.Add(24*time.Hour)) {
		w.Expired = true
		r.advice("RCP-07", Caution, w.At, "the waiver of %s ended on %s and waives nothing any more", w.Code, w.Until)
	}
}

func (r *reader) unused() {
	for _, p := range r.recipe.Parameters {
		if !r.usedParameters[p.Name] {
			r.advice("RCP-06", Note, p.At, "parameter %q is not used", p.Name)
		}
	}
	for _, w := range r.recipe.Waters {
		if !w.Used && !w.FromStock {
			r.advice("RCP-06", Note, w.At, "water %q is not used", w.Name)
		}
	}
	for _, m := range r.recipe.Materials {
		if !m.Used && !m.FromStock {
			r.advice("RCP-06", Note, m.At, "material %q is not used", m.Name)
		}
	}
	for _, l := range r.recipe.Liquors {
		if !l.Used {
			r.advice("RCP-06", Note, l.At, "liquor %q is not used", l.Name)
		}
	}
	for _, t := range r.recipe.Tanks {
		if !t.Used && !t.FromStock {
			r.advice("RCP-06", Note, t.At, "tank %q is not used", t.Name)
		}
	}
}
