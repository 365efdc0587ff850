package trace

import (
	"fmt"
	"math"
	"strings"

	"dregs/equilibrium"
	"dregs/recipe"
)

// line is one line of contents, ready to be turned into moles.
type line struct {
	content
	name   string
	amount recipe.Quantity
	perKg  float64 // kg of "amount" that one mole stands for, for amounts by mass
}

// mixture is a water or a material given by its contents; the rest is water.
type mixture struct {
	lines      []line
	inert      []line           // what nothing is known of: taken as inert
	alkalinity *recipe.Quantity // as HCO3^-, by equivalents
	at         recipe.Range
	water      *recipe.Water
	ions       bool // charged lines: an analysis
}

// readContents names what each line is. Lines that nothing is known of become
// inert, with a loud note.
func (w *walker) readContents(owner string, list []recipe.Content, at recipe.Range) *mixture {
	m := &mixture{at: at}
	var hardness *recipe.Content
	for i, c := range list {
		switch strings.ToLower(c.What) {
		case "alkalinity":
			m.alkalinity, m.ions = &list[i].Amount, true
			continue
		case "hardness":
			hardness = &list[i]
			continue
		case "water", "h2o":
			continue // the rest, whatever is written
		}
		what, err := w.contentOf(c.What)
		if err != nil {
			w.blind(c.What, fmt.Sprintf("in %q: no data (%v); it is taken as inert and takes no part", owner, err), c.At)
			m.inert = append(m.inert, line{name: c.What, amount: c.Amount, content: what})
			continue
		}
		if what.note != "" {
			w.missing(c.What, fmt.Sprintf("in %q: %s", owner, what.note), c.At)
		}
		l := line{content: what, name: c.What, amount: c.Amount, perKg: what.molarKg}
		if c.Amount.As != "" {
			mol, err := w.molPer(what, c.Amount.As)
			if err != nil || !(mol > 0) {
				w.problem(codeImpossible, true, c.Amount.At, "a formula that holds the same element", "%s of %q cannot be given as %s", c.What, owner, c.Amount.As)
				continue
			}
			l.perKg = 1 / mol
		}
		m.ions = m.ions || what.charge != 0
		m.lines = append(m.lines, l)
	}
	if hardness != nil {
		w.hardness(owner, m, hardness)
	}
	return m
}

// hardness fills in the one of calcium and magnesium that the analysis lacks.
func (w *walker) hardness(owner string, m *mixture, h *recipe.Content) {
	total, err := w.contentOf("Ca")
	if err != nil {
		return
	}
	l := line{content: total, name: "Ca", amount: h.Amount, perKg: total.molarKg}
	if mol, err := w.molPer(total, "CaCO3"); err == nil && h.Amount.Dimension == recipe.MassPerVolume {
		l.perKg = 1 / mol
	}
	has := map[string]*line{}
	for i := range m.lines {
		has[bare(m.lines[i].name)] = &m.lines[i]
	}
	ca, mg := has["Ca"], has["Mg"]
	switch {
	case ca != nil && mg != nil:
		return // said already, ion by ion
	case ca == nil && mg == nil:
		w.missing("hardness", fmt.Sprintf("in %q: calcium and magnesium are not told apart, all of it is taken as calcium", owner), h.At)
		m.lines = append(m.lines, l)
	default:
		known, name := ca, "Mg"
		if ca == nil {
			known, name = mg, "Ca"
		}
		whole, err1 := molPerL(l, 1, 1)
		part, err2 := molPerL(*known, 1, 1)
		rest, err3 := w.contentOf(name)
		if err1 != nil || err2 != nil || err3 != nil {
			return
		}
		l.content, l.name = rest, name
		l.amount = recipe.Quantity{Value: math.Max(whole-part, 0), Dimension: recipe.MolPerVolume, Text: h.Amount.Text, At: h.Amount.At}
		m.lines = append(m.lines, l)
	}
	m.ions = true
}

// components that a mixture needs in the System.
func (m *mixture) components() []string {
	var out []string
	for _, l := range m.lines {
		for _, p := range l.parts {
			out = append(out, p.Component)
		}
	}
	if m.ions { // to close the balance of charges
		out = append(out, "Na^+", "Cl^-")
	}
	if m.alkalinity != nil || m.water != nil && m.water.PH != nil {
		out = append(out, "CO3^2-")
	}
	return out
}

// molPerL is the mol per litre of a line in a mixture of that density and water
// content.
func molPerL(l line, densityKgL, waterFraction float64) (float64, error) {
	n, err := molPerKg(l, densityKgL, waterFraction)
	return n * densityKgL, err
}

// molPerKg is the mol per kg of mixture.
func molPerKg(l line, densityKgL, waterFraction float64) (float64, error) {
	v := l.amount.Value
	if !(v >= 0) || math.IsInf(v, 0) {
		return 0, fmt.Errorf("%s is no amount", l.amount.Text)
	}
	switch l.amount.Dimension {
	case recipe.MassFraction:
		return v / l.perKg, nil
	case recipe.MassPerVolume:
		return v / l.perKg / densityKgL, nil
	case recipe.MolPerVolume:
		return v / densityKgL, nil
	case recipe.EqPerVolume:
		z := math.Abs(l.charge)
		for _, p := range l.parts {
			if l.charge == 0 && strings.HasSuffix(p.Component, "+") && p.Coefficient > 0 {
				z += p.Coefficient * chargeInName(p.Component)
			}
		}
		if z == 0 {
			return 0, fmt.Errorf("%s carries no charge, so it has no equivalents", l.name)
		}
		return v / z / densityKgL, nil
	case recipe.Molality:
		return v * waterFraction, nil
	}
	return 0, fmt.Errorf("%s is no concentration", l.amount.Text)
}

func chargeInName(name string) float64 {
	f, err := equilibrium.ParseFormula("H^" + name[strings.IndexByte(name, '^')+1:])
	if err != nil {
		return 1
	}
	return math.Abs(f.Charge)
}

// alkalinityPerKg is in mol of charge per kg.
func alkalinityPerKg(q *recipe.Quantity, densityKgL float64) float64 {
	perL := q.Value
	switch q.Dimension {
	case recipe.MassPerVolume, recipe.MassFraction:
		as, eq := q.As, 1.0
		if as == "" || as == "CaCO3" {
			as, eq = "CaCO3", 2
		}
		f, err := equilibrium.ParseFormula(as)
		if err != nil {
			return math.NaN()
		}
		if as == "CO3" || as == "CaO" || as == "Na2CO3" || as == "CO3^2-" {
			eq = 2
		}
		perL *= eq / (f.MolarMass() / 1000)
		if q.Dimension == recipe.MassFraction {
			return perL
		}
	}
	return perL / densityKgL // mol/L and eq/L alike: mol of HCO3^-
}
