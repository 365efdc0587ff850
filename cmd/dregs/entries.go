package main

import (
	"math"
	"strings"

	"dregs/equilibrium"
	"dregs/equilibrium/catalogue"
)

// allEntries are the tables and the catalogue as one list: components, dissolved
// species, solids, gases, substances.
func allEntries() []entry {
	db := database()
	var out []entry
	for _, x := range db.Components {
		out = append(out, entry{kind: "component", name: x.Name, molarMass: x.MolarMass, density: math.NaN(), Origin: x.Origin})
	}
	for _, x := range db.Species {
		if _, also := db.Component(x.Name); also {
			continue
		}
		out = append(out, entry{kind: "dissolved", name: x.Name, reaction: reactionText(x.Parts, x.Name, true), logK: &x.LogK, molarMass: math.NaN(), density: math.NaN(), Origin: x.Origin})
	}
	for _, x := range db.Phases {
		out = append(out, entry{kind: "solid", name: x.Name, formula: x.Formula, synonyms: x.Synonyms, reaction: reactionText(x.Parts, x.Formula, false), logK: &x.LogK,
			forms: formsText(x), molarMass: x.MolarMass, density: x.DensityKgL, Origin: x.Origin})
	}
	for _, x := range db.Gases {
		out = append(out, entry{kind: "gas", name: x.Name, reaction: x.Name + "(g) = " + x.Species, logK: &x.LogK, molarMass: math.NaN(), density: math.NaN(), Origin: x.Origin})
	}
	for _, x := range catalogue.All() {
		out = append(out, entry{kind: "substance", name: x.Name, formula: x.Formula, synonyms: x.Synonyms, reaction: reactionText(x.Parts, x.Formula, false), substance: x,
			molarMass: x.MolarMass, density: x.DensityKgL, Origin: equilibrium.Origin{Source: x.Source, FromMemory: x.FromMemory, Note: x.Note}})
	}
	return out
}

func formsText(p *equilibrium.Phase) string {
	switch p.Forms {
	case equilibrium.FormsFast:
		return "readily"
	case equilibrium.FormsSlow:
		return "slowly: only when the batch is aged or the solid is there"
	}
	return "when hot, from " + fixed(p.FormsAboveC, 0) + " °C"
}

// reactionText writes parts as a reaction: formation puts the name behind the
// sign of equality, dissolution before it.
func reactionText(parts []equilibrium.Part, name string, formation bool) string {
	if len(parts) == 0 {
		return ""
	}
	var with, against []string
	for _, p := range parts {
		term := p.Component
		if n := math.Abs(p.Coefficient); n != 1 {
			term = figures(n, 4) + " " + term
		}
		if p.Coefficient > 0 {
			with = append(with, term)
		} else {
			against = append(against, term)
		}
	}
	if name == "" {
		name = "one mole"
	}
	if formation {
		return strings.Join(with, " + ") + " = " + strings.Join(append([]string{name}, against...), " + ")
	}
	return strings.Join(append([]string{name}, against...), " + ") + " = " + strings.Join(with, " + ")
}
