package catalogue

import (
	"fmt"
	"math"
	"slices"
	"sort"
	"strconv"
	"strings"

	"dregs/equilibrium"
)

// Decompose finds the components that a formula brings, for substances that the
// catalogue lacks: Ca(NO3)2.4H2O gives Ca^2+, 2 NO3^-, 4 H2O. Known groups are
// found in the text, the rest is taken atom by atom; the valence of iron follows
// from the charge. The result is proved by balancing elements and charge. The
// error says what cannot be told (two valences that balance, an element without
// data, a group that nothing is known of) and what to write instead.
func Decompose(db *equilibrium.Database, formula string) ([]equilibrium.Part, error) {
	f, err := equilibrium.ParseFormula(formula)
	if err != nil {
		return nil, err
	}
	text := plainFormula(formula)
	for _, state := range []string{"(aq)", "(s)", "(l)", "(g)", "(cr)"} {
		text = strings.TrimSuffix(text, state)
	}
	text, _, _ = strings.Cut(text, "^")
	d := decomposer{db: db, formula: formula, sum: map[string]float64{}, free: map[string]float64{}, charge: f.Charge}
	if cell, ok := whole[text]; ok && f.Charge == 0 {
		parts, err := parseBrings(cell)
		if err != nil {
			return nil, err
		}
		d.add(parts, 1)
	} else {
		for i, part := range splitDots(text) {
			multiple := 1.0
			if i > 0 {
				multiple, part = leading(part)
			}
			d.read(part, multiple)
		}
		if err := d.atoms(f); err != nil {
			return nil, err
		}
	}
	parts := d.parts()
	if err := db.Balance(parts, f.Counts, f.Charge); err != nil {
		return nil, d.refuse("it cannot be written in the components of the tables (%v)", err)
	}
	return parts, nil
}

type decomposer struct {
	db      *equilibrium.Database
	formula string
	sum     map[string]float64 // by component
	free    map[string]float64 // atoms outside of groups
	groups  []string           // texts of the groups found
	charge  float64            // still to be brought by the atoms
}

// refuse is the error with the way out.
func (d *decomposer) refuse(format string, values ...any) error {
	return fmt.Errorf("%s: %s; write a material block with contents, in components that are known, or inert = true", d.formula, fmt.Sprintf(format, values...))
}

func (d *decomposer) add(parts []equilibrium.Part, n float64) {
	for _, p := range parts {
		d.sum[p.Component] += p.Coefficient * n
	}
}

// read takes one part of a formula that ParseFormula has accepted: brackets are
// balanced, symbols are elements.
func (d *decomposer) read(text string, multiple float64) {
	for at := 0; at < len(text); {
		if g, ok := groupAt(text, at); ok {
			at += len(g.text)
			d.groups = append(d.groups, g.text)
			d.add(g.parts, multiple)
			d.charge -= g.charge * multiple
			continue
		}
		switch c := text[at]; c {
		case '(', '[', '{':
			end := closing(text, at)
			n, width := countAt(text, end+1)
			d.read(text[at+1:end], multiple*n)
			at = end + 1 + width
		default:
			width := 1
			if at+1 < len(text) && text[at+1] >= 'a' && text[at+1] <= 'z' {
				width = 2
			}
			n, digits := countAt(text, at+width)
			d.free[text[at:at+width]] += n * multiple
			at += width + digits
		}
	}
}

// groupAt finds the longest group whose text stands at a place. A digit behind it
// belongs to it and makes it another group: CN2 is not two CN.
func groupAt(text string, at int) (group, bool) {
	var best group
	for _, g := range groups {
		if len(g.text) <= len(best.text) || !strings.HasPrefix(text[at:], g.text) {
			continue
		}
		if next := at + len(g.text); next < len(text) && (text[next] >= '0' && text[next] <= '9' || text[next] >= 'a' && text[next] <= 'z') {
			continue
		}
		best = g
	}
	return best, best.text != ""
}

func closing(text string, open int) int {
	depth := 0
	for i := open; i < len(text); i++ {
		switch text[i] {
		case '(', '[', '{':
			depth++
		case ')', ']', '}':
			if depth--; depth == 0 {
				return i
			}
		}
	}
	return len(text) - 1
}

// countAt is the number at a place, 1 when there is none, and its width.
func countAt(text string, at int) (float64, int) {
	end := at
	for end < len(text) && text[end] >= '0' && text[end] <= '9' {
		end++
	}
	n, err := strconv.Atoi(text[min(at, len(text)):end])
	if err != nil {
		return 1, end - at
	}
	return float64(n), end - at
}

// splitDots cuts at the dots that join parts; a dot between digits at the start of
// a part is a decimal point, as in CaSO4.0.5H2O.
func splitDots(text string) []string {
	var parts []string
	start := 0
	for i := 0; i < len(text); i++ {
		number := len(parts) > 0 && i > start && strings.Trim(text[start:i], "0123456789") == ""
		if text[i] == '.' && !number {
			parts = append(parts, text[start:i])
			start = i + 1
		}
	}
	return append(parts, text[start:])
}

func leading(part string) (float64, string) {
	rest := strings.TrimLeft(part, "0123456789.")
	if n, err := strconv.ParseFloat(part[:len(part)-len(rest)], 64); err == nil {
		return n, rest
	}
	return 1, rest
}

// atoms gives every atom outside of a group its component, iron last: it has two.
func (d *decomposer) atoms(f equilibrium.Formula) error {
	if err := d.inertComplex(f); err != nil {
		return err
	}
	symbols := make([]string, 0, len(d.free))
	for e := range d.free {
		symbols = append(symbols, e)
	}
	sort.Strings(symbols)
	var open string
	var choices []*equilibrium.Component
	for _, e := range symbols {
		n := d.free[e]
		if g, ok := oxo[e]; ok {
			d.add(g.parts, n)
			d.charge -= g.charge * n
			continue
		}
		ions := d.ions(e)
		switch len(ions) {
		case 0:
			return d.unknown(e)
		case 1:
			d.sum[ions[0].Name] += n
			d.charge -= ions[0].Charge * n
		default:
			open, choices = e, ions
		}
	}
	if open != "" {
		return d.valence(open, choices)
	}
	if math.Abs(d.charge) > 1e-9 {
		return d.refuse("its charges do not balance: with %s they are off by %+.3g, so it holds a valence or an oxidation state that the tables lack, and redox is not computed", d.told(symbols), -d.charge)
	}
	return nil
}

// ions are the components of one atom, such as Fe^2+ and Fe^3+.
func (d *decomposer) ions(element string) []*equilibrium.Component {
	var out []*equilibrium.Component
	for _, c := range d.db.Components {
		if c.Charge != 0 && len(c.Formula.Counts) == 1 && c.Formula.Counts[element] == 1 {
			out = append(out, c)
		}
	}
	return out
}

func (d *decomposer) valence(element string, choices []*equilibrium.Component) error {
	n := d.free[element]
	var names []string
	for _, c := range choices {
		if math.Abs(d.charge-n*c.Charge) < 1e-9 {
			d.sum[c.Name] += n
			return nil
		}
		names = append(names, c.Name)
	}
	return d.refuse("the charge leaves %+.3g for each %s, which is neither %s: several valences, or one that the tables lack", d.charge/n, element, strings.Join(names, " nor "))
}

func (d *decomposer) unknown(element string) error {
	switch element {
	case "C", "N", "P":
		e, _ := equilibrium.LookupElement(element)
		return d.refuse("it has %s outside of the groups that are known (such as CO3, NO3, PO4, CH3COO)", e.Name)
	}
	if e, ok := equilibrium.LookupElement(element); ok {
		return d.refuse("the tables have no component for %s (%s)", e.Name, element)
	}
	return d.refuse("the tables have no component for %s", element)
}

// inertComplex refuses what would balance and still be wrong: complexes that do
// not take part in equilibria, and a sulfide that hides other valences.
func (d *decomposer) inertComplex(f equilibrium.Formula) error {
	cyanide := slices.Contains(d.groups, "CN")
	switch {
	case cyanide && (f.Counts["Fe"] > 0 || f.Counts["Co"] > 0 || f.Counts["Cr"] > 0):
		return d.refuse("its cyanide complex is inert and no equilibrium of the tables")
	case d.free["S"] > 0 && f.Counts["Cu"] > 0 && f.Counts["Fe"] > 0:
		return d.refuse("its copper and iron may have either valence")
	case f.Counts["Co"] > 0 && slices.Contains(d.groups, "NH3"):
		return d.refuse("it may be an inert cobalt(III) ammine")
	}
	return nil
}

// told names the atoms as they were counted.
func (d *decomposer) told(symbols []string) string {
	var out []string
	for _, e := range symbols {
		if g, ok := oxo[e]; ok {
			out = append(out, fmt.Sprintf("%s %+g", e, g.charge))
		} else if ions := d.ions(e); len(ions) == 1 {
			out = append(out, ions[0].Name)
		}
	}
	return strings.Join(append(out, d.groups...), ", ")
}

// parts in the order of the components, water last.
func (d *decomposer) parts() []equilibrium.Part {
	var out []equilibrium.Part
	put := func(name string) {
		if n := d.sum[name]; math.Abs(n) > 1e-9 {
			out = append(out, equilibrium.Part{Component: name, Coefficient: n})
		}
	}
	var names []string
	for name := range d.sum {
		if name != "H2O" && name != "H^+" {
			names = append(names, name)
		}
	}
	place := map[string]int{}
	for i, c := range d.db.Components {
		place[c.Name] = i
	}
	sort.Slice(names, func(i, j int) bool {
		if place[names[i]] != place[names[j]] {
			return place[names[i]] < place[names[j]]
		}
		return names[i] < names[j]
	})
	for _, name := range append(names, "H^+", "H2O") {
		put(name)
	}
	return out
}
