package catalogue

import (
	_ "embed"
	"encoding/csv"
	"fmt"
	"math"
	"slices"
	"sort"
	"strconv"
	"strings"
	"sync"

	"dregs/equilibrium"
)

//go:embed substances.csv
var substancesCSV string

// book is the catalogue with its indexes.
type book struct {
	list      []*Substance // ordered by name
	byFormula map[string]*Substance
	byName    map[string]*Substance
	names     func() []string                // these two on first use: checking one recipe
	stems     func() map[string][]*Substance // needs neither
}

// built is loaded on first use. A fault in the table panics: the tests of this
// package prove it sound.
var built = sync.OnceValue(func() *book {
	b, err := load(substancesCSV)
	if err != nil {
		panic("catalogue: substances.csv: " + err.Error())
	}
	return b
})

func load(text string) (*book, error) {
	reader := csv.NewReader(strings.NewReader(text))
	reader.Comment = '#'
	rows, err := reader.ReadAll()
	if err != nil {
		return nil, err
	}
	if len(rows) == 0 {
		return nil, fmt.Errorf("no rows")
	}
	column := map[string]int{}
	for i, name := range rows[0] {
		column[name] = i
	}
	b := &book{byFormula: make(map[string]*Substance, 2*len(rows)), byName: make(map[string]*Substance, 4*len(rows))}
	for _, row := range rows[1:] {
		s, err := readSubstance(func(name string) string {
			if i, ok := column[name]; ok {
				return strings.TrimSpace(row[i])
			}
			return ""
		})
		if err == nil {
			err = b.enter(s)
		}
		if err != nil {
			return nil, fmt.Errorf("%q: %w", row[0], err)
		}
	}
	sort.Slice(b.list, func(i, j int) bool { return b.list[i].Name < b.list[j].Name })
	b.names, b.stems = sync.OnceValue(b.allNames), sync.OnceValue(b.allStems)
	return b, nil
}

func readSubstance(cell func(string) string) (*Substance, error) {
	basis := cell("basis")
	s := &Substance{
		Name: cell("name"), Formula: cell("formula"), Synonyms: list(cell("synonyms")), Form: cell("form"),
		Hazards: list(cell("hazards")), NoData: cell("no_data"), Inert: cell("inert") == "yes",
		Source: cell("source"), Note: cell("note"), MolarMass: math.NaN(),
		FromMemory: strings.Contains(strings.ToLower(basis), "memory"),
	}
	if s.Name == "" {
		return nil, fmt.Errorf("no name")
	}
	var err error
	if s.Formula != "" {
		f, err := equilibrium.ParseFormula(s.Formula)
		if err != nil {
			return nil, err
		}
		s.MolarMass = f.MolarMass()
	}
	for _, n := range []struct {
		name string
		to   *float64
	}{{"strength_wt", &s.StrengthWt}, {"density_kg_l", &s.DensityKgL}, {"heat_kj_mol", &s.HeatKJPerMol}} {
		if *n.to, err = number(cell(n.name)); err != nil {
			return nil, fmt.Errorf("%s: %w", n.name, err)
		}
	}
	if !(s.StrengthWt > 0 && s.StrengthWt <= 1) {
		return nil, fmt.Errorf("strength_wt is not above 0 and at most 1")
	}
	if s.Parts, err = parseBrings(cell("brings")); err != nil {
		return nil, err
	}
	for _, h := range s.Hazards {
		if _, ok := Meaning(h); !ok {
			return nil, fmt.Errorf("%q is not a hazard class", h)
		}
	}
	ways := 0
	for _, given := range []bool{s.Computed(), s.NoData != "", s.Inert} {
		if given {
			ways++
		}
	}
	if ways != 1 {
		return nil, fmt.Errorf("must have exactly one of brings, no_data, inert")
	}
	return s, nil
}

// list cuts a cell of several values.
func list(cell string) []string {
	var out []string
	for _, v := range strings.Split(cell, ";") {
		if v = strings.TrimSpace(v); v != "" {
			out = append(out, v)
		}
	}
	return out
}

// number is NaN for an empty cell.
func number(cell string) (float64, error) {
	if cell == "" {
		return math.NaN(), nil
	}
	return strconv.ParseFloat(cell, 64)
}

// parseBrings reads "Na^+ + H2O - H^+": signs stand alone, so that the plus of a
// charge is no sign.
func parseBrings(cell string) ([]equilibrium.Part, error) {
	var parts []equilibrium.Part
	sign, coefficient, wantName := 1.0, 1.0, true
	for i, word := range strings.Fields(cell) {
		switch {
		case word == "+" || word == "-":
			if wantName && (i > 0 || word == "+") {
				return nil, fmt.Errorf("brings %q: sign %q in the wrong place", cell, word)
			}
			sign, coefficient, wantName = 1, 1, true
			if word == "-" {
				sign = -1
			}
		case !wantName:
			return nil, fmt.Errorf("brings %q: no sign before %q", cell, word)
		case word[0] >= '0' && word[0] <= '9' && coefficient == 1:
			n, err := strconv.ParseFloat(word, 64)
			if err != nil || !(n > 0) || n > 1000 {
				return nil, fmt.Errorf("brings %q: %q is no coefficient", cell, word)
			}
			coefficient = n
		default:
			parts = append(parts, equilibrium.Part{Component: word, Coefficient: sign * coefficient})
			wantName = false
		}
	}
	if wantName && len(strings.Fields(cell)) > 0 {
		return nil, fmt.Errorf("brings %q ends in the middle", cell)
	}
	return parts, nil
}

// enter puts a substance into the indexes. A formula shared by several entries
// is that of the pure one; names are never shared.
func (b *book) enter(s *Substance) error {
	b.list = append(b.list, s)
	if s.Formula != "" {
		b.enterFormula(s.Formula, s)
	}
	for _, name := range append([]string{s.Name}, s.Synonyms...) {
		if isFormulaOf(name, s) {
			b.enterFormula(name, s)
			continue
		}
		key := foldName(name)
		if other := b.byName[key]; other != nil {
			return fmt.Errorf("name %q is taken by %q", name, other.Name)
		}
		b.byName[key] = s
	}
	return nil
}

func (b *book) enterFormula(text string, s *Substance) {
	key := plainFormula(text)
	if other := b.byFormula[key]; other == nil || other.StrengthWt < s.StrengthWt {
		b.byFormula[key] = s
	}
}

// isFormulaOf tells another writing of the formula (NaCH3COO) from a name that
// happens to read like a formula (KHP): only the former has the same elements.
func isFormulaOf(text string, s *Substance) bool {
	if s.Formula == "" || strings.ContainsRune(text, ' ') || text[0] >= 'a' && text[0] <= 'z' {
		return false // no formula, without parsing: most names
	}
	f, err := equilibrium.ParseFormula(text)
	if err != nil {
		return false
	}
	own := equilibrium.MustParseFormula(s.Formula)
	if len(f.Counts) != len(own.Counts) {
		return false
	}
	for e, n := range own.Counts {
		if math.Abs(f.Counts[e]-n) > 1e-9 {
			return false
		}
	}
	return true
}

func (b *book) allNames() []string {
	var names []string
	for _, s := range b.list {
		names = append(names, s.Name)
		if s.Formula != "" {
			names = append(names, s.Formula)
		}
		names = append(names, s.Synonyms...)
	}
	sort.Strings(names)
	return slices.Compact(names)
}
