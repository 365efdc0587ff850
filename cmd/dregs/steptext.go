package main

import (
	"strings"

	"dregs/recipe"
)

var stepWords = strings.NewReplacer("make_up", "make up")

// stepText is a step as one would read it out: the words of the file, without its
// punctuation.
func stepText(s *recipe.Step) string {
	var parts []string
	head := stepWords.Replace(s.Kind.String())
	if s.What != "" {
		head += " " + s.What
	}
	add := func(word string, q *recipe.Quantity) {
		if q != nil {
			parts = append(parts, strings.TrimSpace(word+" "+q.Text))
		}
	}
	parts = append(parts, head)
	add("", s.Amount)
	add("water", s.Water)
	add("to", s.To)
	if s.PH != nil {
		parts = append(parts, "to pH "+s.PH.Text)
	}
	if s.With != "" {
		parts = append(parts, "with "+s.With)
	}
	add("at most", s.AtMost)
	if s.Gas != "" && s.Gas != s.What {
		parts = append(parts, s.Gas)
	}
	add("at", s.Pressure)
	if s.All {
		parts = append(parts, "all")
	}
	add("", s.Volume)
	if s.Into != nil {
		parts = append(parts, "into "+s.Into.Name)
	}
	if s.Clear {
		parts = append(parts, "clear liquor only")
	}
	add("moisture", s.Moisture)
	add("wash", s.Wash)
	if s.WashWith != "" && s.Wash != nil {
		parts = append(parts, "of "+s.WashWith)
	}
	add("at", s.Temperature)
	add("read at", s.ReadAt)
	add("over", s.Over)
	add("for", s.For)
	add("at least", s.AtLeast)
	for _, d := range s.Doses {
		parts = append(parts, stepText(d))
	}
	if len(parts) > 1 && flowsOn(parts[1]) {
		parts = append([]string{parts[0] + " " + parts[1]}, parts[2:]...)
	}
	return unitText(strings.Join(parts, ", "))
}

// flowsOn tells whether a part reads on from the step's word without a comma:
// "heat to 40 °C", "hold for 30 min".
func flowsOn(part string) bool {
	first, _, _ := strings.Cut(part, " ")
	switch first {
	case "to", "for", "into", "all", "over":
		return true
	}
	return false
}

// unitText writes units as on screens.
func unitText(text string) string {
	return strings.NewReplacer("+-", "±", "degC", "°C", "degF", "°F", "m3", "m³").Replace(text)
}
