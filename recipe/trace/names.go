package trace

import (
	"fmt"
	"math"
	"strings"

	"dregs/equilibrium"
	"dregs/equilibrium/catalogue"
)

// content is one substance or ion of a mixture, by what one mole brings.
type content struct {
	parts   []equilibrium.Part
	molarKg float64             // kg/mol of what the analysis weighs
	formula equilibrium.Formula // for "as N"; empty when the name is no formula
	charge  float64             // net, of parts
	note    string              // a choice made for the user
}

// usual are names of analyses that leave a choice open, with the choice.
var usual = map[string]struct{ species, note string }{
	"Fe":   {"Fe^2+", "iron is taken as Fe^2+, write Fe^3+ when it is ferric"},
	"Cr":   {"Cr^3+", "chromium is taken as Cr^3+, write CrO4 when it is chromate"},
	"Mn":   {"Mn^2+", ""},
	"P":    {"PO4^3-", ""},
	"S":    {"SO4^2-", "sulfur is taken as sulfate"},
	"Si":   {"H4SiO4(aq)", ""},
	"SiO2": {"H4SiO4(aq)", ""},
	"B":    {"B(OH)3(aq)", ""},
	"Mo":   {"MoO4^2-", ""},
	"H":    {"H^+", ""},
}

// protonated are ions as a component with protons and water.
var protonated = map[string][]equilibrium.Part{
	"CO2":   {{Component: "CO3^2-", Coefficient: 1}, {Component: "H^+", Coefficient: 2}, {Component: "H2O", Coefficient: -1}},
	"OH":    {{Component: "H2O", Coefficient: 1}, {Component: "H^+", Coefficient: -1}},
	"HCO3":  {{Component: "CO3^2-", Coefficient: 1}, {Component: "H^+", Coefficient: 1}},
	"HPO4":  {{Component: "PO4^3-", Coefficient: 1}, {Component: "H^+", Coefficient: 1}},
	"H2PO4": {{Component: "PO4^3-", Coefficient: 1}, {Component: "H^+", Coefficient: 2}},
	"HSO4":  {{Component: "SO4^2-", Coefficient: 1}, {Component: "H^+", Coefficient: 1}},
	"HSO3":  {{Component: "SO3^2-", Coefficient: 1}, {Component: "H^+", Coefficient: 1}},
	"NH3":   {{Component: "NH4^+", Coefficient: 1}, {Component: "H^+", Coefficient: -1}},
}

// bare is a name without charge and state: Ca of Ca^2+.
func bare(name string) string {
	name, _, _ = strings.Cut(name, "^")
	return strings.TrimSuffix(name, "(aq)")
}

// contentOf finds what a name in the contents of a water or material means: an
// ion or element, a substance of the catalogue, a dissolved species, or a formula
// that can be taken apart.
func (w *walker) contentOf(name string) (content, error) {
	c := content{}
	c.formula, _ = equilibrium.ParseFormula(name)
	ion := func(parts []equilibrium.Part) (content, error) {
		c.parts = parts
		c.charge = w.chargeOf(parts)
		c.molarKg = w.massOfParts(parts)
		if len(c.formula.Counts) > 0 {
			c.molarKg = c.formula.MolarMass() / 1000
		}
		return c, nil
	}
	plain := bare(name)
	if parts, ok := protonated[plain]; ok {
		return ion(parts)
	}
	if u, ok := usual[name]; ok && u.species != "" {
		c.note = u.note
		return ion([]equilibrium.Part{{Component: u.species, Coefficient: 1}})
	}
	for _, component := range w.db.Components {
		if component.Name == name || bare(component.Name) == name && component.Name != "H2O" || strings.EqualFold(bare(component.Name), name) && len(name) > 3 {
			return ion([]equilibrium.Part{{Component: component.Name, Coefficient: 1}})
		}
	}
	if s, ok := lookup(name); ok {
		if s.Inert || s.NoData != "" || s.Parts == nil {
			reason := s.NoData
			if reason == "" {
				reason = "it is inert"
			}
			return c, fmt.Errorf("%s", reason)
		}
		c.parts, c.molarKg = s.Parts, s.MolarMass/1000
		if f, err := equilibrium.ParseFormula(s.Formula); err == nil {
			c.formula = f
		}
		c.charge = w.chargeOf(c.parts)
		return c, nil
	}
	for _, species := range w.db.Species {
		if species.Name == name || bare(species.Name) == name {
			return ion(species.Parts)
		}
	}
	parts, err := decompose(w.db, name)
	if err != nil {
		return c, err
	}
	return ion(parts)
}

func (w *walker) chargeOf(parts []equilibrium.Part) float64 {
	sum := 0.0
	for _, p := range parts {
		if c, ok := w.db.Component(p.Component); ok {
			sum += c.Charge * p.Coefficient
		}
	}
	if math.Abs(sum) < 1e-12 {
		return 0
	}
	return sum
}

// massOfParts is kg per mol of what the parts make.
func (w *walker) massOfParts(parts []equilibrium.Part) float64 {
	sum := 0.0
	for _, p := range parts {
		if c, ok := w.db.Component(p.Component); ok {
			sum += c.MolarMass * p.Coefficient
		}
	}
	return sum / 1000
}

// equivalents of one mole: the charge of an ion, or the positive charge that a
// salt brings.
func (w *walker) equivalents(c content) float64 {
	if c.charge != 0 {
		return math.Abs(c.charge)
	}
	sum := 0.0
	for _, p := range c.parts {
		if k, ok := w.db.Component(p.Component); ok && k.Charge*p.Coefficient > 0 {
			sum += k.Charge * p.Coefficient
		}
	}
	return sum
}

// molPer gives the moles of c that one kg "as" another formula stands for: by
// equivalents for CaCO3, as water analysts do, else by the element they share.
func (w *walker) molPer(c content, as string) (float64, error) {
	other, err := equilibrium.ParseFormula(as)
	if err != nil {
		return 0, err
	}
	otherKg := other.MolarMass() / 1000
	if z := w.equivalents(c); as == "CaCO3" && z > 0 {
		return 2 / z / otherKg, nil
	}
	shared := ""
	for _, e := range other.Elements() {
		if c.formula.Counts[e] > 0 && (shared == "" || shared == "O" || shared == "H") && e != "O" && e != "H" {
			shared = e
		}
	}
	if shared == "" {
		return 0, fmt.Errorf("%s holds no element of it", as)
	}
	return other.Counts[shared] / c.formula.Counts[shared] / otherKg, nil
}

// The catalogue, as variables so that a test can do without it.
var (
	lookup    = catalogue.Lookup
	decompose = catalogue.Decompose
)
