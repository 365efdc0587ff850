package catalogue

import "dregs/equilibrium"

// Substance is one entry. All amounts are of the pure substance; a usual
// strength says how it is sold in solution.
//
// HeatKJPerMol is from the form and strength as sold to infinite dilution at 25 °C,
// with the ions that are there then: OH^- for a base, HCO3^-, H2PO4^- for such
// salts, both protons of sulfuric acid off, NH3, CO2, SO2, H2S dissolved as such.
type Substance struct {
	Name         string             // calcium nitrate tetrahydrate
	Formula      string             // Ca(NO3)2.4H2O, spelt as in the tables of phases; "" for a mixture
	Synonyms     []string           // trade names, other spellings, other writings of the formula
	Form         string             // crystals, powder, granules, flakes, liquid, solution, slurry, gas
	StrengthWt   float64            // usual strength as sold, mass fraction; 1 for a pure substance
	DensityKgL   float64            // of a liquid or solution as sold at 20 °C; NaN when not known, and for solids, whose bulk density depends on the grain
	MolarMass    float64            // g/mol, NaN without a formula
	Parts        []equilibrium.Part // what one mole brings; nil for an inert one
	HeatKJPerMol float64            // enthalpy of solution, see below; NaN when not known; positive cools
	Hazards      []string           // classes of hazards.go, which the pairs of pairs.go refer to
	Inert        bool
	NoData       string // why the substance cannot be computed ("organic solvent", "oxidiser: redox is not computed"); "" when it can
	Source       string // of strength, density and heat; masses follow from the formula
	FromMemory   bool
	Note         string
}

// Computed reports whether the substance takes part in the equilibrium.
func (s *Substance) Computed() bool { return len(s.Parts) > 0 }
