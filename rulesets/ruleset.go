// Package rulesets reads the limits and levels that the rules go by: the standard
// set, which is embedded, and files of a site that change part of it.
package rulesets

import (
	_ "embed"
	"sort"

	"github.com/hashicorp/hcl/v2/hclsyntax"

	"dregs/recipe"
)

//go:embed standard.rules.hcl
var standardText []byte

const kind = "a ruleset"

// Set is a ruleset.
type Set struct {
	Limits map[string]recipe.Quantity // by name, in the unit of their dimension
	Levels map[string]recipe.Level    // by code, where they differ from the rule's own
}

// Standard is the embedded ruleset. It decides which limits there are and what
// each measures. The caller owns what it gets.
func Standard() *Set {
	body, problem := recipe.Parse("standard.rules.hcl", kind, standardText)
	if problem != nil {
		panic(problem.Message) // the file is part of the program
	}
	r := &reader{set: &Set{Limits: map[string]recipe.Quantity{}, Levels: map[string]recipe.Level{}}, first: true}
	r.read(body, "standard.rules.hcl")
	if len(r.problems) > 0 {
		panic(r.problems[0].Message)
	}
	return r.set
}

// Load changes a set by a file. codes are those that levels may name. The problems
// are all of the file's, in its order; each is fatal, and the set is then as it
// was.
func (s *Set) Load(path string, codes []string) []recipe.Problem {
	body, problem := recipe.Open(path, kind)
	if problem != nil {
		return []recipe.Problem{*problem}
	}
	return s.take(body, path, codes)
}

func (s *Set) take(body *hclsyntax.Body, path string, codes []string) []recipe.Problem {
	r := &reader{set: s.copy(), codes: codes}
	r.read(body, path)
	if len(r.problems) == 0 {
		*s = *r.set
	}
	sort.SliceStable(r.problems, func(i, j int) bool { return r.problems[i].At.Byte < r.problems[j].At.Byte })
	return r.problems
}

func (s *Set) copy() *Set {
	c := &Set{Limits: map[string]recipe.Quantity{}, Levels: map[string]recipe.Level{}}
	for name, limit := range s.Limits {
		c.Limits[name] = limit
	}
	for code, level := range s.Levels {
		c.Levels[code] = level
	}
	return c
}

// names of the limits, sorted.
func (s *Set) names() []string {
	var out []string
	for name := range s.Limits {
		out = append(out, name)
	}
	sort.Strings(out)
	return out
}
