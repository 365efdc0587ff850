package catalogue

import "dregs/equilibrium"

// Substance is one entry. All amounts are of the pure substance; a usual
// strength says how it is sold in solution.
type Substance struct {
	Name         string             // calcium nitrate tetrahydrate
	Formula      string             // Ca(NO3)2.4H2O
	Synonyms     []string           // trade names, other spellings
	Form         string             // crystals, powder, granules, flakes, liquid, solution, gas
	StrengthWt   float64            // usual strength as sold, mass fraction; 1 for a pure substance
	DensityKgL   float64            // of the substance as sold at 20 °C, NaN when not known
	MolarMass    float64            // g/mol
	Parts        []equilibrium.Part // what one mole brings; nil for an inert one
	HeatKJPerMol float64            // enthalpy of solution at infinite dilution, 25 °C, NaN when not known; positive cools
	Hazards      []string           // classes that pair rules use: strong acid, strong base, hypochlorite, cyanide, ...
	Inert        bool
	NoData       string // why the substance cannot be computed ("organic solvent", "oxidiser: redox is not computed"); "" when it can
	Source       string
	FromMemory   bool
	Note         string
}

// Lookup finds a substance by name, synonym or formula, whatever the case of
// names.
func Lookup(name string) (*Substance, bool) { panic("soon") }

// All returns every substance, ordered by name.
func All() []*Substance { panic("soon") }

// Names returns every name, synonym and formula that Lookup takes.
func Names() []string { panic("soon") }

// Decompose finds the components that a formula brings, for substances that the
// catalogue lacks: Ca(NO3)2.4H2O gives Ca^2+, 2 NO3^-, 4 H2O. The error says
// what cannot be told (two valences that balance, an element without data).
func Decompose(db *equilibrium.Database, formula string) ([]equilibrium.Part, error) { panic("soon") }
