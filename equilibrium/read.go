package equilibrium

import (
	"embed"
	"encoding/csv"
	"fmt"
	"math"
	"strconv"
	"strings"
)

// record is a CSV row with named columns.
type record struct {
	file   string
	line   int
	column map[string]int
	cells  []string
}

func (r record) text(name string) string {
	i, ok := r.column[name]
	if !ok || i >= len(r.cells) {
		return ""
	}
	return strings.TrimSpace(r.cells[i])
}

// number is NaN for an empty cell.
func (r record) number(name string) (float64, error) {
	cell := r.text(name)
	if cell == "" {
		return math.NaN(), nil
	}
	v, err := strconv.ParseFloat(cell, 64)
	if err != nil {
		return 0, fmt.Errorf("column %s: %q is not a number", name, cell)
	}
	return v, nil
}

func (r record) origin() Origin {
	basis := r.text("basis")
	return Origin{Source: r.text("source"), Basis: basis, Note: r.text("note"),
		FromMemory: strings.HasPrefix(strings.ToUpper(basis), "MEMORY")}
}

// logK reads the constant's columns. A row must give its range: t_min_c and
// t_max_c are required.
func (r record) logK() (LogK, error) {
	k := LogK{}
	fields := []struct {
		name string
		to   *float64
	}{
		{"log10_k_25c", &k.At25C}, {"enthalpy_kj_per_mol", &k.EnthalpyKJ},
		{"t_min_c", &k.MinC}, {"t_max_c", &k.MaxC}, {"uncertainty_log10", &k.Uncertainty},
	}
	for _, f := range fields {
		v, err := r.number(f.name)
		if err != nil {
			return k, err
		}
		*f.to = v
	}
	for i := range k.C {
		v, err := r.number(fmt.Sprintf("c%d", i+1))
		if err != nil {
			return k, err
		}
		if !math.IsNaN(v) {
			k.C[i], k.HasC = v, true
		}
	}
	switch {
	case math.IsNaN(k.At25C) && !k.HasC:
		return k, fmt.Errorf("no log K")
	case math.IsNaN(k.MinC) || math.IsNaN(k.MaxC):
		return k, fmt.Errorf("no temperature range")
	case math.IsNaN(k.Uncertainty):
		return k, fmt.Errorf("no uncertainty")
	}
	if k.HasC && math.IsNaN(k.At25C) {
		k.At25C = k.At(tempRefK)
	}
	return k, nil
}

func readTable(fs embed.FS, file string, row func(record) error) error {
	f, err := fs.Open("tables/" + file)
	if err != nil {
		return err
	}
	defer f.Close()
	reader := csv.NewReader(f)
	reader.Comment = '#'
	reader.ReuseRecord = true
	r := record{file: file, column: map[string]int{}}
	for {
		cells, err := reader.Read()
		if err != nil {
			if len(r.column) > 0 && cells == nil && err.Error() == "EOF" {
				return nil
			}
			return fmt.Errorf("%s: %w", file, err)
		}
		r.line, _ = reader.FieldPos(0)
		if len(r.column) == 0 {
			for i, name := range cells {
				r.column[strings.Clone(name)] = i
			}
			continue
		}
		r.cells = cells
		if err := row(r); err != nil {
			return fmt.Errorf("%s:%d: %s: %w", file, r.line, cells[0], err)
		}
	}
}

func (db *Database) readComponent(r record) error {
	formula, err := ParseFormula(r.text("formula"))
	if err != nil {
		return err
	}
	charge, err := r.number("charge")
	if err != nil {
		return err
	}
	c := &Component{Name: r.text("name"), Charge: charge, Formula: formula, MolarMass: formula.MolarMass(), Origin: r.origin()}
	if db.component[c.Name] != nil {
		return fmt.Errorf("listed twice")
	}
	db.Components = append(db.Components, c)
	db.component[c.Name] = c
	if c.Name == "H2O" {
		return nil
	}
	s := &Species{Name: c.Name, Charge: charge, Parts: []Part{{c.Name, 1}},
		LogK: LogK{EnthalpyKJ: 0, MinC: 0, MaxC: 100}, Origin: c.Origin}
	db.Species = append(db.Species, s)
	db.species[s.Name] = s
	return nil
}

func (db *Database) readSpecies(r record) error {
	k, err := r.logK()
	if err != nil {
		return err
	}
	charge, err := r.number("charge")
	if err != nil {
		return err
	}
	s := &Species{Name: r.text("species"), Charge: charge, LogK: k, Origin: r.origin()}
	reaction, err := ParseReaction(r.text("reaction"))
	if err != nil {
		return err
	}
	if s.Parts, err = db.formation(reaction, s.Name); err != nil {
		return err
	}
	return db.addSpecies(s)
}

func (db *Database) addSpecies(s *Species) error {
	if db.species[s.Name] != nil {
		return fmt.Errorf("species %s is listed twice", s.Name)
	}
	sum := 0.0
	for _, p := range s.Parts {
		c, ok := db.component[p.Component]
		if !ok {
			return fmt.Errorf("%q is not a component", p.Component)
		}
		sum += c.Charge * p.Coefficient
	}
	if math.Abs(sum-s.Charge) > 1e-9 {
		return fmt.Errorf("charge of %s is %g, its components carry %g", s.Name, s.Charge, sum)
	}
	db.Species = append(db.Species, s)
	db.species[s.Name] = s
	return nil
}

// formation turns a reaction that has the product once on the right into the
// parts that form one mole of it.
func (db *Database) formation(r Reaction, product string) ([]Part, error) {
	var parts []Part
	found := false
	for _, t := range r.Right {
		if t.Name == product {
			if t.Coefficient != 1 || found {
				return nil, fmt.Errorf("reaction must form one mole of %s", product)
			}
			found = true
			continue
		}
		parts = append(parts, Part{t.Name, -t.Coefficient})
	}
	if !found {
		return nil, fmt.Errorf("reaction does not form %s", product)
	}
	for _, t := range r.Left {
		parts = append(parts, Part{t.Name, t.Coefficient})
	}
	return parts, nil
}

// dissolution turns a reaction that has the solid once on the left into the
// parts that one mole gives.
func dissolution(r Reaction, solid string) ([]Part, error) {
	var parts []Part
	found := false
	for _, t := range r.Left {
		if t.Name == solid && !found {
			if t.Coefficient != 1 {
				return nil, fmt.Errorf("reaction must dissolve one mole of %s", solid)
			}
			found = true
			continue
		}
		parts = append(parts, Part{t.Name, -t.Coefficient})
	}
	if !found {
		return nil, fmt.Errorf("reaction does not dissolve %s", solid)
	}
	for _, t := range r.Right {
		parts = append(parts, Part{t.Name, t.Coefficient})
	}
	return parts, nil
}

func (db *Database) readPhase(r record) error {
	k, err := r.logK()
	if err != nil {
		return err
	}
	p := &Phase{Name: r.text("name"), Formula: r.text("formula"), LogK: k, Origin: r.origin()}
	if list := r.text("synonyms"); list != "" {
		for _, s := range strings.Split(list, ";") {
			p.Synonyms = append(p.Synonyms, strings.TrimSpace(s))
		}
	}
	switch r.text("forms") {
	case "fast":
		p.Forms = FormsFast
	case "slow":
		p.Forms = FormsSlow
	case "hot":
		p.Forms = FormsHot
		if p.FormsAboveC, err = r.number("forms_above_c"); err != nil {
			return err
		}
		if math.IsNaN(p.FormsAboveC) {
			return fmt.Errorf("a hot phase needs forms_above_c")
		}
	default:
		return fmt.Errorf("forms is %q, want fast, slow or hot", r.text("forms"))
	}
	if p.DensityKgL, err = r.number("density_g_cm3"); err != nil {
		return err
	}
	reaction, err := ParseReaction(r.text("reaction"))
	if err != nil {
		return err
	}
	if p.Parts, err = dissolution(reaction, p.Formula); err != nil {
		return err
	}
	return db.addPhase(p)
}

func (db *Database) addPhase(p *Phase) error {
	formula, err := ParseFormula(p.Formula)
	if err != nil {
		return err
	}
	if p.MolarMass == 0 { // phases are shared between databases: written once
		p.MolarMass = formula.MolarMass()
	}
	if err := db.Balance(p.Parts, formula.Counts, 0); err != nil {
		return fmt.Errorf("phase %s: %w", p.Name, err)
	}
	for _, name := range append([]string{p.Name}, p.Synonyms...) {
		key := foldName(name)
		if other := db.phase[key]; other != nil {
			return fmt.Errorf("%q is already the name of %s", name, other.Name)
		}
		db.phase[key] = p
	}
	db.Phases = append(db.Phases, p)
	list := db.formula[p.Formula]
	at := len(list)
	for at > 0 && list[at-1].Forms > p.Forms {
		at--
	}
	list = append(list[:at:at], append([]*Phase{p}, list[at:]...)...)
	db.formula[p.Formula] = list
	return nil
}

func (db *Database) readGas(r record) error {
	k, err := r.logK()
	if err != nil {
		return err
	}
	g := &Gas{Name: r.text("name"), Species: r.text("species"), LogK: k, Origin: r.origin()}
	if db.species[g.Species] == nil {
		return fmt.Errorf("%q is not a species", g.Species)
	}
	db.Gases = append(db.Gases, g)
	return nil
}

func (db *Database) readInteraction(r record) error {
	t := &IonPairTerm{Cation: r.text("cation"), Anion: r.text("anion"), Origin: r.origin()}
	var err error
	if t.Epsilon, err = r.number("epsilon_kg_per_mol"); err != nil {
		return err
	}
	if t.Uncertainty, err = r.number("uncertainty"); err != nil {
		return err
	}
	for _, name := range []string{t.Cation, t.Anion} {
		if db.species[name] == nil {
			return fmt.Errorf("%q is not a species", name)
		}
	}
	db.Interactions = append(db.Interactions, t)
	return nil
}
