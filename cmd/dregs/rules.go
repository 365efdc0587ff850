package main

import (
	"strings"
	"sync"

	"dregs/checks"
	"dregs/recipe"
)

// explained is a code with its text, whether a rule finds it or the reader.
type explained struct {
	Code, Title, Text string
	Level             recipe.Level // zero when it depends on the case
}

// explanations are all codes, rules first, in the order of the registry.
func explanations() []explained {
	var out []explained
	for _, r := range checks.All {
		out = append(out, explained{r.Code, r.Title, r.Text, r.Level})
	}
	for _, c := range recipe.Codes {
		out = append(out, explained{Code: c.Code, Title: c.Title, Text: c.Text})
	}
	return out
}

func knownCode(code string) bool {
	for _, known := range checks.Codes() {
		if known == code {
			return true
		}
	}
	return false
}

// rulebook reads the rulesets that recipes name, each set of files once. It may
// be used by several workers.
type rulebook struct {
	site string // file of the call, "" for none
	lock sync.Mutex
	read map[string]reading
}

type reading struct {
	thresholds *checks.Thresholds
	problems   []recipe.Problem
}

// forRecipe gives the limits for a recipe: the standard ones, changed by the files
// it names and then by that of the call. A nil recipe names none.
func (b *rulebook) forRecipe(r *recipe.Recipe) (*checks.Thresholds, []recipe.Problem) {
	var paths []string
	if r != nil {
		paths = append(paths, r.Rules...)
	}
	if b.site != "" {
		paths = append(paths, b.site)
	}
	key := strings.Join(paths, "\x00")
	b.lock.Lock()
	defer b.lock.Unlock()
	got, ok := b.read[key]
	if !ok {
		got.thresholds, got.problems = checks.ReadThresholds(paths...)
		if b.read == nil {
			b.read = map[string]reading{}
		}
		b.read[key] = got
	}
	return got.thresholds, got.problems
}
