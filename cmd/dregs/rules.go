package main

import (
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
