package catalogue

import (
	"fmt"
	"math"
	"strings"
	"testing"

	"dregs/equilibrium"
)

func TestDecompose(t *testing.T) {
	for formula, want := range map[string]string{
		"Ca(NO3)2.4H2O":        "Ca^2+ 1, NO3^- 2, H2O 4",
		"CaSO4.0.5H2O":         "Ca^2+ 1, SO4^2- 1, H2O 0.5",
		"FeCl3":                "Fe^3+ 1, Cl^- 3",
		"FeCl2.4H2O":           "Fe^2+ 1, Cl^- 2, H2O 4",
		"FeOOH":                "Fe^3+ 1, H^+ -3, H2O 2",
		"Fe2(SO4)3":            "Fe^3+ 2, SO4^2- 3",
		"NaHCO3":               "Na^+ 1, CO3^2- 1, H^+ 1",
		"Ca(H2PO4)2.H2O":       "Ca^2+ 1, PO4^3- 2, H^+ 4, H2O 1",
		"NH4Al(SO4)2.12H2O":    "NH4^+ 1, Al^3+ 1, SO4^2- 2, H2O 12",
		"NaOH":                 "Na^+ 1, H^+ -1, H2O 1",
		"NH4OH":                "NH4^+ 1, H^+ -1, H2O 1",
		"[Cu(NH3)4]SO4.H2O":    "NH4^+ 4, Cu^2+ 1, SO4^2- 1, H^+ -4, H2O 1",
		"Na2B4O7.10H2O":        "Na^+ 2, B(OH)3(aq) 4, H^+ -2, H2O 5",
		"Na2SiO3":              "Na^+ 2, H4SiO4(aq) 1, H^+ -2, H2O -1",
		"Na2SiF6":              "Na^+ 2, F^- 6, H4SiO4(aq) 1, H^+ 4, H2O -4",
		"Na2S.9H2O":            "Na^+ 2, HS^- 1, H^+ -1, H2O 9",
		"NaAlO2":               "Na^+ 1, Al^3+ 1, H^+ -4, H2O 2",
		"K2Cr2O7":              "K^+ 2, CrO4^2- 2, H^+ 2, H2O -1",
		"CrO3":                 "CrO4^2- 1, H^+ 2, H2O -1",
		"Cr2O3":                "Cr^3+ 2, H^+ -6, H2O 3",
		"CrPO4.4H2O":           "Cr^3+ 1, PO4^3- 1, H2O 4",
		"SO3":                  "SO4^2- 1, H^+ 2, H2O -1",
		"SO2":                  "SO3^2- 1, H^+ 2, H2O -1",
		"CO2":                  "CO3^2- 1, H^+ 2, H2O -1",
		"P2O5":                 "PO4^3- 2, H^+ 6, H2O -3",
		"CH3COOH":              "Acetate^- 1, H^+ 1",
		"CH3COONa.3H2O":        "Na^+ 1, Acetate^- 1, H2O 3",
		"(CH3COO)2Ca":          "Ca^2+ 1, Acetate^- 2",
		"HCOOH":                "Formate^- 1, H^+ 1",
		"KHC8H4O4":             "K^+ 1, Phthalate^2- 1, H^+ 1",
		"KHC2O4.H2C2O4.2H2O":   "K^+ 1, Oxalate^2- 2, H^+ 3, H2O 2",
		"Na2H2C10H12N2O8.2H2O": "Na^+ 2, EDTA^4- 1, H^+ 2, H2O 2",
		"(NH4)6Mo7O24.4H2O":    "NH4^+ 6, MoO4^2- 7, H^+ 8",
		"Na2O.3.3SiO2":         "Na^+ 2, H4SiO4(aq) 3.3, H^+ -2, H2O -5.6",
		"H2O":                  "H2O 1",
		"SO4^2-":               "SO4^2- 1",
		"HPO4^2-":              "PO4^3- 1, H^+ 1",
		"NaCl(s)":              "Na^+ 1, Cl^- 1",
		"ZnSO₄·7H₂O":           "Zn^2+ 1, SO4^2- 1, H2O 7",
		"KCNS":                 "K^+ 1, SCN^- 1",
		"Na2S2O5":              "Na^+ 2, SO3^2- 2, H^+ 2, H2O -1",
		"NaH2C6H5O7":           "Na^+ 1, Citrate^3- 1, H^+ 2",
		"CaMg3(CO3)4":          "Mg^2+ 3, Ca^2+ 1, CO3^2- 4",
		"Pb3(CO3)2(OH)2":       "Pb^2+ 3, CO3^2- 2, H^+ -2, H2O 2",
		"Co(NO3)2":             "Co^2+ 1, NO3^- 2",
		"COCl2":                "!carbon outside",
		"CoCl2":                "Co^2+ 1, Cl^- 2",
		"Fe3O4":                "!neither Fe^2+ nor Fe^3+",
		"CuCl":                 "!do not balance",
		"MnO2":                 "!do not balance",
		"H2O2":                 "!do not balance",
		"Na2O2":                "!do not balance",
		"NaClO":                "!do not balance",
		"NaClO3":               "!do not balance",
		"KIO3":                 "!do not balance",
		"Na2S2O8":              "!do not balance",
		"Na2S2O4":              "!do not balance",
		"FeS2":                 "!neither",
		"CuFeS2":               "!either valence",
		"Cl2":                  "!do not balance",
		"Zn":                   "!do not balance",
		"Fe":                   "!neither",
		"K2MnO4":               "!do not balance",
		"Na5P3O10":             "!phosphorus outside",
		"Na4P2O7":              "!phosphorus outside",
		"NaH2PO2":              "!phosphorus outside",
		"SnCl2.2H2O":           "!no component for tin (Sn)",
		"HgCl2":                "!no component for mercury (Hg)",
		"NaN3":                 "!nitrogen outside",
		"N2H4":                 "!nitrogen outside",
		"CaCN2":                "!carbon outside",
		"CO(NH2)2":             "!carbon outside",
		"C12H22O11":            "!carbon outside",
		"C2H5OH":               "!carbon outside",
		"CH3COOC2H5":           "!carbon outside",
		"HCOOCH3":              "!carbon outside",
		"CH3CH2COOH":           "!carbon outside",
		"HOCH2COOH":            "!carbon outside",
		"K4Fe(CN)6":            "!inert",
		"[Co(NH3)6]Cl3":        "!ammine",
		"KOCN":                 "!do not balance",
		"NaBH4":                "!do not balance",
		"NaBO3":                "!do not balance",
		"Xx2":                  "!not an element",
		"":                     "!empty formula",
		"CaSO4.":               "!dot",
		"2CaSO4.H2O":           "!formula",
	} {
		parts, err := Decompose(equilibrium.Default(), formula)
		switch reason, fails := strings.CutPrefix(want, "!"); {
		case fails && (err == nil || !strings.Contains(err.Error(), reason)):
			t.Errorf("%s: got %s, %v; want the refusal %q", formula, show(parts), err, reason)
		case !fails && (err != nil || show(parts) != want):
			t.Errorf("%s: got %s, %v; want %s", formula, show(parts), err, want)
		}
	}
}

// Where Decompose answers for an entry, it must agree with what the table says;
// the two were written independently of each other.
func TestDecomposeAgreesWithTable(t *testing.T) {
	db := equilibrium.Default()
	agree, refused, computed := 0, []string{}, 0
	for _, s := range All() {
		if s.Formula == "" || s.StrengthWt < 1 {
			continue
		}
		parts, err := Decompose(db, s.Formula)
		switch {
		case err == nil && !s.Computed():
			t.Errorf("%s (%s): taken apart as %s, the table says %q", s.Name, s.Formula, show(parts), s.NoData)
		case !s.Computed():
		case err != nil:
			computed++
			refused = append(refused, s.Formula)
		default:
			computed++
			agree++
			if d := difference(parts, s.Parts); d != "" {
				t.Errorf("%s (%s): %s taken apart, %s in the table: %s", s.Name, s.Formula, show(parts), show(s.Parts), d)
			}
		}
	}
	t.Logf("%d of %d computed substances taken apart alike; refused: %s", agree, computed, strings.Join(refused, " "))
	if agree < 280 {
		t.Errorf("only %d formulas are taken apart", agree)
	}
}

// The phases are formulas that somebody else wrote.
func TestDecomposeAgreesWithPhases(t *testing.T) {
	db := equilibrium.Default()
	agree := 0
	var refused []string
	for _, p := range db.Phases {
		parts, err := Decompose(db, p.Formula)
		if err != nil {
			refused = append(refused, p.Formula)
			continue
		}
		agree++
		if d := difference(parts, p.Parts); d != "" {
			t.Errorf("%s (%s): %s taken apart, %s in the phases", p.Name, p.Formula, show(parts), show(p.Parts))
		}
	}
	t.Logf("%d of %d phases; refused: %s", agree, len(db.Phases), strings.Join(refused, " "))
	if agree < len(db.Phases)*9/10 {
		t.Errorf("only %d of %d phases", agree, len(db.Phases))
	}
}

func difference(a, b []equilibrium.Part) string {
	sum := map[string]float64{}
	for _, p := range a {
		sum[p.Component] += p.Coefficient
	}
	for _, p := range b {
		sum[p.Component] -= p.Coefficient
	}
	for _, p := range append(append([]equilibrium.Part{}, a...), b...) {
		if math.Abs(sum[p.Component]) > 1e-9 {
			return fmt.Sprintf("%s differs by %g", p.Component, sum[p.Component])
		}
	}
	return ""
}

func FuzzDecompose(f *testing.F) {
	for _, s := range All() {
		f.Add(s.Formula)
	}
	for _, text := range []string{"", ".", "((", "C2H3O2C2H3O2", "(CN)2", "Fe(((OH)))3", "NaCl^", "SO3^2-", "H2O.0.5", "P2O5^+", "Ca.1e9H2O"} {
		f.Add(text)
	}
	db := equilibrium.Default()
	f.Fuzz(func(t *testing.T, text string) {
		parts, err := Decompose(db, text)
		if err != nil {
			if err.Error() == "" || parts != nil {
				t.Errorf("%q: %v with %s", text, err, show(parts))
			}
			return
		}
		formula, err := equilibrium.ParseFormula(text)
		if err != nil {
			t.Fatalf("%q is no formula and was taken apart", text)
		}
		if err := db.Balance(parts, formula.Counts, formula.Charge); err != nil {
			t.Errorf("%q: %v", text, err)
		}
		again, _ := Decompose(db, text)
		if show(again) != show(parts) {
			t.Errorf("%q: %s, then %s", text, show(parts), show(again))
		}
	})
}
