package catalogue

import (
	"slices"
	"strings"
)

// Lookup finds a substance by name, synonym or formula. Names are taken whatever
// their case, hyphens and the older spellings with "ph" (sulphate); formulas are
// taken to the letter (Co is not CO), with any of the dots . · * before the water.
// A formula means the pure substance, also where it is sold in solution.
func Lookup(name string) (*Substance, bool) {
	b := built()
	if s, ok := b.byFormula[plainFormula(name)]; ok {
		return s, true
	}
	s, ok := b.byName[foldName(name)]
	return s, ok
}

// All returns every substance, ordered by name.
func All() []*Substance { return slices.Clone(built().list) }

// Names returns every name, synonym and formula that Lookup takes, ordered.
func Names() []string { return slices.Clone(built().names()) }

// older spellings and ways to write a strength, folded into one.
var spellings = strings.NewReplacer("sulph", "sulf", "aluminum", "aluminium", "cesium", "caesium",
	" wt%", "%", " wt %", "%", " % w/w", "%", "% w/w", "%", " (", "(", " %", "%", "-", " ", "’", "'")

func foldName(s string) string {
	s = strings.Join(strings.Fields(strings.ToLower(s)), " ")
	if !strings.ContainsAny(s, "-%(’") && !strings.Contains(s, "sulph") && !strings.Contains(s, "aluminum") && !strings.Contains(s, "cesium") {
		return s // nothing to replace: most names
	}
	return strings.Join(strings.Fields(spellings.Replace(s)), " ")
}

var dots = strings.NewReplacer("·", ".", "•", ".", "∙", ".", "⋅", ".", "*", ".", " ", "",
	"₀", "0", "₁", "1", "₂", "2", "₃", "3", "₄", "4", "₅", "5", "₆", "6", "₇", "7", "₈", "8", "₉", "9")

// plainFormula brings the writings of a hydrate into the form of the tables.
func plainFormula(s string) string { return dots.Replace(strings.TrimSpace(s)) }
