package main

import (
	"encoding/json"
	"io"

	"dregs/recipe"
)

// schema is the number of the JSON layout; it changes when a field changes its
// meaning or goes.
const schema = 1

type placeJSON struct {
	File   string `json:"file"`
	Line   int    `json:"line"`
	Column int    `json:"column"`
}

func placeOf(at recipe.Range) placeJSON { return placeJSON{at.File, at.Line, at.Column} }

// writeJSON writes an object; figures are rounded and what was not computed is
// null, so that the same input gives the same bytes.
func writeJSON(out io.Writer, object any) error {
	e := json.NewEncoder(out)
	e.SetEscapeHTML(false)
	e.SetIndent("", "  ")
	return e.Encode(object)
}

// optional is s, or null when it says nothing.
func optional(s string) *string {
	if s == "" {
		return nil
	}
	return &s
}
