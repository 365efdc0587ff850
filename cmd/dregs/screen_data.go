package main

import (
	"fmt"
	"io"
	"math"
	"sort"
	"strings"

	"dregs/equilibrium"
)

var kinds = []struct{ kind, head string }{
	{"component", "components"}, {"dissolved", "dissolved species"}, {"solid", "solids"}, {"gas", "gases"}, {"substance", "substances of the catalogue"},
}

func (c *call) dataScreen(word string, entries []entry, tempK float64) {
	p := c.page()
	if word == "" {
		p.counts(entries)
	} else {
		for _, k := range kinds {
			p.kind(k.kind, k.head, entries, tempK)
		}
	}
	p.caution()
	io.WriteString(c.out, p.String())
}

// counts tells how much there is, and how much of it rests on memory.
func (p *page) counts(entries []entry) {
	var rows [][]string
	for _, k := range kinds {
		n, memory := 0, 0
		for _, e := range entries {
			if e.kind == k.kind {
				n++
				if e.FromMemory {
					memory++
				}
			}
		}
		rows = append(rows, []string{k.head, fmt.Sprint(n), fmt.Sprint(memory)})
	}
	p.table(0, []column{{head: "rows of"}, {head: "number", right: true}, {head: "from memory", right: true}}, rows)
	p.line()
	families := map[string]int{}
	for _, e := range explanations() {
		family, _, _ := strings.Cut(e.Code, "-")
		families[family]++
	}
	var names []string
	for family := range families {
		names = append(names, family)
	}
	sort.Strings(names)
	for i, family := range names {
		names[i] = fmt.Sprintf("%s %d", family, families[family])
	}
	p.hang(0, "rules", 18, strings.Join(names, ", "), p.faint)
	p.hang(0, "model", 18, modelName(), p.faint)
}

func modelName() string {
	sys, err := database().NewSystem(nil)
	if err != nil {
		return ""
	}
	return sys.ModelName()
}

func (p *page) kind(kind, head string, entries []entry, tempK float64) {
	first := true
	for _, e := range entries {
		if e.kind != kind {
			continue
		}
		if first {
			p.rule("═")
			p.line(p.strong.Sprint(head))
			first = false
		}
		p.rule("─")
		p.entry(e, tempK)
	}
}

func (p *page) entry(e entry, tempK float64) {
	title := e.name
	if e.kind == "component" || e.kind == "dissolved" || e.kind == "gas" {
		title = ionText(e.name)
	}
	p.ends(title, ionText(e.formula), p.strong)
	row := func(label, text string) {
		if text != "" {
			p.hang(2, label, 14, text, p.faint)
		}
	}
	row("also", strings.Join(e.synonyms, ", "))
	if e.logK == nil {
		row("brings", reactionOnScreen(e.reaction))
	} else {
		row("reaction", reactionOnScreen(e.reaction))
		row("log10 K", logKText(e.logK, tempK))
		row("range", fmt.Sprintf("%s to %s °C", fixed(e.logK.MinC, 0), fixed(e.logK.MaxC, 0)))
	}
	row("forms", e.forms)
	if !math.IsNaN(e.molarMass) {
		row("molar mass", fixed(e.molarMass, 3)+" g/mol")
	}
	if e.substance == nil && !math.IsNaN(e.density) {
		row("density", figures(e.density, 4)+" kg/L")
	}
	if s := e.substance; s != nil {
		p.substance(e, row)
		row("cautions", strings.Join(s.Hazards, ", "))
	}
	source := e.Source
	if e.FromMemory {
		source += " (from memory)"
	}
	row("source", source)
	row("note", e.Note)
}

// substance is how it is sold.
func (p *page) substance(e entry, row func(label, text string)) {
	s := e.substance
	form := s.Form
	if s.StrengthWt > 0 && s.StrengthWt < 1 {
		form += ", usually " + figures(100*s.StrengthWt, 3) + " wt%"
	}
	if !math.IsNaN(s.DensityKgL) {
		form += ", " + figures(s.DensityKgL, 4) + " kg/L at 20 °C"
	}
	row("sold as", form)
	if !math.IsNaN(s.HeatKJPerMol) {
		word := "warms"
		if s.HeatKJPerMol > 0 {
			word = "cools"
		}
		row("dissolving", fmt.Sprintf("%s, %s kJ/mol", word, fixed(math.Abs(s.HeatKJPerMol), 1)))
	}
	if s.Inert {
		row("computed", "no: inert")
	} else if s.NoData != "" {
		row("computed", "no: "+s.NoData)
	}
}

func logKText(k *equilibrium.LogK, tempK float64) string {
	text := fmt.Sprintf("%s ± %s at 25 °C", fixed(k.At25C, 3), figures(k.Uncertainty, 2))
	if !math.IsNaN(tempK) {
		text += fmt.Sprintf(", %s ± %s at %s °C", fixed(k.At(tempK), 3), figures(k.UncertaintyAt(tempK), 2), fixed(tempK-equilibrium.ZeroCelsius, 1))
		if !k.InRange(tempK) {
			text += ", outside the range"
		}
	}
	if !k.HasC && math.IsNaN(k.EnthalpyKJ) {
		text += "; the same at every temperature, no enthalpy is known"
	}
	return text
}

// reactionOnScreen writes every word of a reaction as on screens.
func reactionOnScreen(reaction string) string {
	words := strings.Fields(reaction)
	for i, word := range words {
		if i > 0 && (words[i-1] != "+" && words[i-1] != "=") || !isNumber(word) {
			words[i] = ionText(word)
		}
	}
	return strings.Join(words, " ")
}
