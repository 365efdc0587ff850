package catalogue

import (
	"math"
	"testing"

	"dregs/equilibrium"
)

func find(t *testing.T, name string) *Substance {
	t.Helper()
	s, ok := Lookup(name)
	if !ok {
		t.Fatalf("%q is not found", name)
	}
	return s
}

// Densities at 20 °C. Source: CRC Handbook of Chemistry and Physics,
// Concentrative Properties of Aqueous Solutions, and Perry, Chemical Engineers'
// Handbook, section 2; from memory, and interpolated where the table has no such
// strength. The tolerance is the fourth figure of the table, doubled where we
// interpolate.
func TestDensities(t *testing.T) {
	for name, want := range map[string]float64{
		"sodium hydroxide 50 %":     1.5253,
		"sodium hydroxide 30 %":     1.3279,
		"sodium hydroxide 20 %":     1.2191,
		"sulfuric acid 98 %":        1.8361,
		"sulfuric acid 50 %":        1.3951,
		"hydrochloric acid 30 %":    1.1492,
		"nitric acid 60 %":          1.3667,
		"phosphoric acid 85 %":      1.6890,
		"phosphoric acid 75 %":      1.5790,
		"ammonia solution 10 %":     0.9575,
		"ammonia solution 20 %":     0.9229,
		"calcium chloride 30 %":     1.2816,
		"magnesium chloride 30 %":   1.2688,
		"sodium chloride brine 26%": 1.1972,
		"ammonium sulfate 40 %":     1.2277,
		"ammonium nitrate 50 %":     1.2258,
	} {
		if got := find(t, name).DensityKgL; math.Abs(got-want) > 1e-3 {
			t.Errorf("%s: %g kg/L, the table has %g", name, got, want)
		}
	}
	// Between two strengths of the table.
	for name, between := range map[string][4]float64{ // wt%, density, wt%, density
		"sulfuric acid 96 %":      {90, 1.8144, 98, 1.8361},
		"hydrochloric acid 32 %":  {30, 1.1492, 38, 1.1885},
		"hydrochloric acid 37 %":  {30, 1.1492, 38, 1.1885},
		"nitric acid 65 %":        {60, 1.3667, 70, 1.4134},
		"nitric acid 53 %":        {50, 1.3100, 60, 1.3667},
		"ammonia solution 25 %":   {20, 0.9229, 28, 0.8980},
		"calcium chloride 36 %":   {30, 1.2816, 40, 1.3957},
		"sodium hydroxide 25 %":   {20, 1.2191, 30, 1.3279},
		"potassium hydroxide 45%": {40, 1.3991, 50, 1.5143}, // 15 °C, Perry
	} {
		s := find(t, name)
		x := (100*s.StrengthWt - between[0]) / (between[2] - between[0])
		want := between[1] + x*(between[3]-between[1])
		if math.Abs(s.DensityKgL-want) > 0.006 {
			t.Errorf("%s: %g kg/L, the table gives %.4f", name, s.DensityKgL, want)
		}
	}
}

// The heat of sulfuric acid follows from the well-known formula of Thomsen,
// 74.7 n/(n + 1.80) kJ/mol given off by one mole on n moles of water (as quoted
// by Perry; from memory), counted from the 96.2 kJ/mol of infinite dilution. The
// formula itself is up to 3.5 kJ/mol off the table that the entries follow.
func TestHeatOfSulfuricAcid(t *testing.T) {
	for _, s := range All() {
		if s.Formula != "H2SO4" || s.StrengthWt == 1 {
			continue
		}
		n := (1 - s.StrengthWt) / 18.015 / (s.StrengthWt / s.MolarMass)
		want := -96.19 + 74.7*n/(n+1.7983)
		if math.Abs(s.HeatKJPerMol-want) > 4 {
			t.Errorf("%s: %g kJ/mol, the formula gives %.1f", s.Name, s.HeatKJPerMol, want)
		}
	}
}

// Enthalpies of solution that every textbook prints. Source: CRC Handbook of
// Chemistry and Physics, Enthalpy of Solution of Electrolytes (after Parker 1965,
// NSRDS-NBS 2), and for the last four the NBS tables of 1982; from memory.
func TestHeats(t *testing.T) {
	for formula, want := range map[string]float64{
		"NaCl": 3.88, "KCl": 17.22, "NH4NO3": 25.69, "KNO3": 34.89, "NaOH": -44.51, "KOH": -57.61,
		"NH4Cl": 14.78, "NaNO3": 20.5, "NaC2H3O2.3H2O": 19.66, "AgNO3": 22.59, "LiCl": -37.03, "KMnO4": 43.56,
		"Na2SO4.10H2O": 79, "CaCl2": -81.3, "CuSO4.5H2O": 6, "CaO": -81.9,
	} {
		if got := find(t, formula).HeatKJPerMol; math.Abs(got-want) > 0.6 {
			t.Errorf("%s: %g kJ/mol, want %g", formula, got, want)
		}
	}
}

// More water in the crystal leaves less heat to give: along the hydrates of one
// salt the heat of solution rises.
func TestHeatsOfHydratesRise(t *testing.T) {
	seen := 0
	for _, dry := range []string{"CaCl2", "MgCl2", "MgSO4", "FeSO4", "CuSO4", "ZnSO4", "Na2CO3", "Na2SO4", "Ca(NO3)2", "Mg(NO3)2", "Na2HPO4", "Na3PO4", "Al2(SO4)3", "NiSO4", "MnSO4", "LiOH", "KOH", "NaOH", "NaC2H3O2", "NaI", "NaBr", "LiCl", "BaCl2", "SrCl2", "AlCl3", "FeCl3", "FeCl2", "CoCl2", "NiCl2", "CuCl2", "MnCl2", "CdCl2", "Sr(NO3)2", "Na2S2O3", "CaSO4", "CaHPO4"} {
		last := math.Inf(-1)
		for _, water := range []string{"", ".0.5H2O", ".H2O", ".1.5H2O", ".2H2O", ".2.5H2O", ".3H2O", ".4H2O", ".5H2O", ".6H2O", ".7H2O", ".8H2O", ".9H2O", ".10H2O", ".12H2O", ".18H2O"} {
			s, ok := Lookup(dry + water)
			if !ok || math.IsNaN(s.HeatKJPerMol) {
				continue
			}
			if s.HeatKJPerMol <= last {
				t.Errorf("%s: %g kJ/mol, below %g of the hydrate with less water", s.Formula, s.HeatKJPerMol, last)
			}
			last = s.HeatKJPerMol
			seen++
		}
	}
	if seen < 70 {
		t.Errorf("only %d heats", seen)
	}
}

// Molar masses of 14 entries. Source: labels and data sheets as anybody knows
// them; from memory. Labels follow older atomic weights, hence 0.03.
func TestMolarMasses(t *testing.T) {
	for formula, want := range map[string]float64{
		"CaSO4.2H2O": 172.17, "MgSO4.7H2O": 246.47, "FeSO4.7H2O": 278.01, "CuSO4.5H2O": 249.68, "Na2B4O7.10H2O": 381.37,
		"KHC8H4O4": 204.22, "KH2PO4": 136.09, "Na2HPO4.12H2O": 358.14, "Na2S2O3.5H2O": 248.18, "C6H8O7.H2O": 210.14,
		"Na2H2C10H12N2O8.2H2O": 372.24, "KH3(C2O4)2.2H2O": 254.19, "Al2(SO4)3.18H2O": 666.43, "KAl(SO4)2.12H2O": 474.38,
	} {
		if got := find(t, formula).MolarMass; math.Abs(got-want) > 0.03 {
			t.Errorf("%s: %.3f g/mol, want %.2f", formula, got, want)
		}
	}
}

// What a fertiliser bag or a drum prints, from memory of usual labels: the element
// or oxide content follows from formula and strength.
func TestContentsOfGrades(t *testing.T) {
	for _, c := range []struct {
		name, element string
		wt, within    float64
	}{
		{"calcium nitrate 15.5-0-0", "N", 0.155, 0.003},
		{"calcium nitrate 15.5-0-0", "Ca", 0.187, 0.004},
		{"iron(III) sulfate 43 %", "Fe", 0.120, 0.002},
		{"iron(III) chloride 40 %", "Fe", 0.138, 0.002},
		{"ferric sodium EDTA", "Fe", 0.150, 0.010},
		{"aluminium sulfate granules", "Al", 0.0905, 0.002}, // 17 % Al2O3
		{"liquid alum", "Al", 0.0426, 0.001},                // 8.1 % Al2O3
		{"sodium silicate", "Si", 0.1316, 0.003},            // 28 % SiO2
		{"monoammonium phosphate", "P", 0.269, 0.001},       // 61.7 % P2O5
		{"urea", "N", 0.466, 0.001},
		{"manganese sulfate", "Mn", 0.325, 0.001},
		{"borax pentahydrate", "B", 0.148, 0.001},
	} {
		s := find(t, c.name)
		f := equilibrium.MustParseFormula(s.Formula)
		e, _ := equilibrium.LookupElement(c.element)
		if got := f.Counts[c.element] * e.AtomicWeight / s.MolarMass * s.StrengthWt; math.Abs(got-c.wt) > c.within {
			t.Errorf("%s: %.2f %% %s, the label says %.2f", c.name, 100*got, c.element, 100*c.wt)
		}
	}
}
