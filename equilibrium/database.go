package equilibrium

import (
	"embed"
	"fmt"
	"math"
	"strings"
	"sync"
)

//go:embed tables/*.csv
var tables embed.FS

// Readiness says how readily a phase comes down.
type Readiness int

// How readily a phase forms. The zero value is not valid.
const (
	_         Readiness = iota
	FormsFast           // in process time
	FormsSlow           // hindered: watched, formed only when a batch is aged or the solid is there already
	FormsHot            // only when heated: formed at or above Phase.FormsAboveC
)

func (r Readiness) String() string {
	switch r {
	case FormsFast:
		return "fast"
	case FormsSlow:
		return "slow"
	case FormsHot:
		return "hot"
	}
	return "unknown"
}

// Origin tells where a row's figures come from.
type Origin struct {
	Source     string // publication, with table or page where known
	FromMemory bool   // nobody re-read the publication for this row
	Basis      string // how the figure was come by, in words
	Note       string // doubts, and why this row was chosen over another
}

// Component is a building block: every species and solid is made of components.
type Component struct {
	Name      string // Ca^2+, Acetate^-, B(OH)3(aq), H2O
	Charge    float64
	Formula   Formula // elements: C2H3O2 for Acetate^-
	MolarMass float64 // g/mol
	Origin
}

// Part is a component with its coefficient.
type Part struct {
	Component   string
	Coefficient float64
}

// Species is a dissolved substance formed from components. Every component but
// H2O is also a species with log K = 0 and itself as its one part.
type Species struct {
	Name   string
	Charge float64
	Parts  []Part // one mole is formed from these; negative = given off
	LogK   LogK   // of formation from the components
	Origin
}

// Phase is a solid.
type Phase struct {
	Name        string // gypsum
	Formula     string // CaSO4.2H2O
	Synonyms    []string
	Parts       []Part // what one mole gives on dissolving; negative = taken up
	LogK        LogK   // of dissolution into the components
	Forms       Readiness
	FormsAboveC float64 // for FormsHot
	DensityKgL  float64 // NaN when not known
	MolarMass   float64 // g/mol
	Own         bool    // added by the user's stock file
	Origin
}

// Gas is a gas above the liquor.
type Gas struct {
	Name    string // CO2
	Species string // its dissolved form, CO2(aq)
	LogK    LogK   // Henry constant, mol/(kg bar): gas = dissolved form
	Origin
}

// IonPairTerm is a specific ion interaction coefficient ε.
type IonPairTerm struct {
	Cation, Anion string
	Epsilon       float64 // kg/mol
	Uncertainty   float64
	Origin
}

//go:generate go run ./internal/calibrate tables/uncalibrated.csv ../testdata/solubility.csv tables/calibrated.csv

// Database holds the tables. It is not changed after loading; a site's own
// phases and species come with [Database.With].
type Database struct {
	Components   []*Component
	Species      []*Species
	Phases       []*Phase
	Gases        []*Gas
	Interactions []*IonPairTerm

	component map[string]*Component
	species   map[string]*Species
	phase     map[string]*Phase // by folded name, synonym
	formula   map[string][]*Phase
}

// Default returns the built-in tables, loaded on first use. A fault in them
// panics: the tests of this package prove them sound.
var Default = sync.OnceValue(func() *Database {
	db, err := load(tables)
	if err != nil {
		panic("equilibrium: built-in tables: " + err.Error())
	}
	return db
})

func load(fs embed.FS) (*Database, error) {
	db := &Database{component: map[string]*Component{}, species: map[string]*Species{}, phase: map[string]*Phase{}, formula: map[string][]*Phase{}}
	readers := []struct {
		file string
		row  func(record) error
	}{
		{"components.csv", db.readComponent},
		{"aqueous.csv", db.readSpecies},
		{"phases.csv", db.readPhase},
		{"calibrated.csv", db.readPhase},
		{"gases.csv", db.readGas},
		{"interaction.csv", db.readInteraction},
	}
	for _, r := range readers {
		// calibrated.csv is made from the others; without it they must still load.
		if _, err := fs.Open("tables/" + r.file); err != nil && r.file == "calibrated.csv" {
			continue
		}
		if err := readTable(fs, r.file, r.row); err != nil {
			return nil, err
		}
	}
	return db, nil
}

// Component finds a component by name.
func (db *Database) Component(name string) (*Component, bool) {
	c, ok := db.component[name]
	return c, ok
}

// LookupSpecies finds a dissolved species by name.
func (db *Database) LookupSpecies(name string) (*Species, bool) {
	s, ok := db.species[name]
	return s, ok
}

// LookupPhase finds a phase by mineral name, synonym, or formula (the most
// readily formed one when several share a formula).
func (db *Database) LookupPhase(name string) (*Phase, bool) {
	if p, ok := db.phase[foldName(name)]; ok {
		return p, true
	}
	list := db.PhasesOf(name)
	if len(list) == 0 {
		return nil, false
	}
	return list[0], true
}

// PhasesOf returns the phases of one formula, the most readily formed first.
func (db *Database) PhasesOf(formula string) []*Phase {
	return db.formula[plainDigits(strings.TrimSpace(formula))]
}

// PhaseNames returns all names and synonyms by which phases are known.
func (db *Database) PhaseNames() []string {
	var out []string
	for _, p := range db.Phases {
		out = append(out, p.Name)
		out = append(out, p.Synonyms...)
	}
	return out
}

// foldName makes names comparable: case, and spaces against hyphens.
func foldName(s string) string {
	return strings.Join(strings.Fields(strings.ReplaceAll(strings.ToLower(s), "-", " ")), " ")
}

// With returns a database that holds the given phases and species besides; a
// phase or species of the same name replaces the built-in one. The receiver is
// unchanged.
func (db *Database) With(phases []*Phase, species []*Species) (*Database, error) {
	out := &Database{Gases: db.Gases, component: map[string]*Component{}, species: map[string]*Species{}, phase: map[string]*Phase{}, formula: map[string][]*Phase{}, Interactions: db.Interactions}
	for _, c := range db.Components {
		out.Components = append(out.Components, c)
		out.component[c.Name] = c
	}
	replacedSpecies, replacedPhase := map[string]bool{}, map[string]bool{}
	for _, s := range species {
		replacedSpecies[s.Name] = true
	}
	for _, p := range phases {
		replacedPhase[foldName(p.Name)] = true
	}
	for _, s := range db.Species {
		if !replacedSpecies[s.Name] {
			out.Species = append(out.Species, s)
			out.species[s.Name] = s
		}
	}
	for _, s := range species {
		if err := out.addSpecies(s); err != nil {
			return nil, err
		}
	}
	for _, p := range append(append([]*Phase{}, db.Phases...), phases...) {
		if !p.Own && replacedPhase[foldName(p.Name)] {
			continue
		}
		if err := out.addPhase(p); err != nil {
			return nil, err
		}
	}
	return out, nil
}

// Balance reports whether parts hold the elements and charge of a substance;
// the error names what is off.
func (db *Database) Balance(parts []Part, elements map[string]float64, charge float64) error {
	left := map[string]float64{}
	for e, n := range elements {
		left[e] += n
	}
	for _, p := range parts {
		c, ok := db.component[p.Component]
		if !ok {
			return fmt.Errorf("%q is not a component", p.Component)
		}
		for e, n := range c.Formula.Counts {
			left[e] -= n * p.Coefficient
		}
		charge -= c.Charge * p.Coefficient
	}
	for e, n := range left {
		if math.Abs(n) > 1e-9 {
			return fmt.Errorf("element %s is off by %g", e, n)
		}
	}
	if math.Abs(charge) > 1e-9 {
		return fmt.Errorf("charge is off by %g", charge)
	}
	return nil
}
