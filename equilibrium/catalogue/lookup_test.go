package catalogue

import (
	"fmt"
	"math"
	"slices"
	"strings"
	"testing"

	"dregs/equilibrium"
)

func show(parts []equilibrium.Part) string {
	var out []string
	for _, p := range parts {
		out = append(out, fmt.Sprintf("%s %g", p.Component, p.Coefficient))
	}
	return strings.Join(out, ", ")
}

func TestLookup(t *testing.T) {
	for name, want := range map[string]string{
		"CaSO4.2H2O":                     "calcium sulfate dihydrate",
		"CaSO4·2H2O":                     "calcium sulfate dihydrate",
		"CaSO4*2H2O":                     "calcium sulfate dihydrate",
		"CaSO4 · 2 H2O":                  "calcium sulfate dihydrate",
		"CaSO₄·2H₂O":                     "calcium sulfate dihydrate",
		"Gypsum":                         "calcium sulfate dihydrate",
		"CH3COONa":                       "sodium acetate",
		"NaCH3COO":                       "sodium acetate",
		"NaC2H3O2":                       "sodium acetate",
		"sulphuric acid":                 "sulfuric acid 96 %",
		"Sulfuric Acid 96%":              "sulfuric acid 96 %",
		"sulfuric acid 96 wt%":           "sulfuric acid 96 %",
		"H2SO4":                          "sulfuric acid 100 %",
		"caustic soda 50 %":              "sodium hydroxide 50 %",
		"Caustic Soda":                   "sodium hydroxide",
		"sodium hydroxide solution 25 %": "sodium hydroxide 25 %",
		"NaOH":                           "sodium hydroxide",
		"HCl":                            "hydrogen chloride",
		"nitric acid":                    "nitric acid 65 %",
		"phosphoric acid 75%":            "phosphoric acid 75 %",
		"ammonia solution 25 %":          "ammonia solution 25 %",
		"acetic acid":                    "acetic acid",
		"glacial acetic acid":            "acetic acid",
		"aluminum sulfate":               "aluminium sulfate",
		"KHC8H4O4":                       "potassium hydrogen phthalate",
		"khp":                            "potassium hydrogen phthalate",
		"potassium tetroxalate":          "potassium tetroxalate",
		"KH2C6H5O7":                      "potassium dihydrogen citrate",
		"borax":                          "borax",
		"Na2HPO4.12H2O":                  "disodium phosphate dodecahydrate",
		"citric acid":                    "citric acid",
		"Epsom Salt":                     "magnesium sulfate heptahydrate",
		"Mohr's salt":                    "ammonium iron(II) sulfate hexahydrate",
		"Iron (II) Sulfate Heptahydrate": "iron(II) sulfate heptahydrate",
		"water-glass":                    "sodium silicate solution, ratio 3.3",
		"magnesium-sulfate heptahydrate": "magnesium sulfate heptahydrate",
		"3CdSO4.8H2O":                    "cadmium sulfate 8/3-hydrate",
		"sodium hypochlorite solution":   "sodium hypochlorite 12.5 %",
		"Na2H2EDTA.2H2O":                 "disodium EDTA dihydrate",
		"calcium nitrate tetrahydrate":   "calcium nitrate tetrahydrate",
		"NH4NO3":                         "ammonium nitrate",
	} {
		s, ok := Lookup(name)
		if !ok {
			t.Errorf("%q is not found", name)
			continue
		}
		if s.Name != want {
			t.Errorf("%q finds %q, want %q", name, s.Name, want)
		}
	}
	// Formulas do not fold: CO is no cobalt, hcl is nothing, NACL is nothing.
	for _, name := range []string{"", " ", "CO", "hcl", "NACL", "nacl", "unobtainium", "caso4.2h2o", "%", "."} {
		if s, ok := Lookup(name); ok {
			t.Errorf("%q finds %q", name, s.Name)
		}
	}
}

// Every name, synonym and formula finds its entry; a formula shared with a
// solution finds the pure substance.
func TestNamesFind(t *testing.T) {
	for _, s := range All() {
		for _, name := range append([]string{s.Name}, s.Synonyms...) {
			got, ok := Lookup(name)
			switch {
			case !ok:
				t.Errorf("%q of %q is not found", name, s.Name)
			case got != s && !isFormulaOf(name, s):
				t.Errorf("%q of %q finds %q", name, s.Name, got.Name)
			}
		}
		if s.Formula == "" {
			continue
		}
		got, ok := Lookup(s.Formula)
		if !ok || !sameCounts(got.Formula, s.Formula) {
			t.Errorf("formula %s of %q finds another substance", s.Formula, s.Name)
			continue
		}
		if got.StrengthWt != 1 {
			t.Errorf("formula %s finds %q, which is not pure", s.Formula, got.Name)
		}
		if s.StrengthWt == 1 && got != s {
			t.Errorf("formula %s stands for two pure substances, %q and %q", s.Formula, got.Name, s.Name)
		}
	}
}

func TestNamesOrdered(t *testing.T) {
	names := Names()
	if !slices.IsSorted(names) {
		t.Error("not ordered")
	}
	if len(slices.Compact(slices.Clone(names))) != len(names) {
		t.Error("duplicates")
	}
	for _, n := range names {
		if _, ok := Lookup(n); !ok {
			t.Errorf("%q is not found", n)
		}
	}
	t.Logf("%d names", len(names))
	names[0] = "spoilt"
	if Names()[0] == "spoilt" {
		t.Error("the caller can spoil the list")
	}
}

// A name with a hydrate word must be of a formula with so much water.
func TestHydrateWords(t *testing.T) {
	count := map[string]float64{"hemihydrate": 0.5, "monohydrate": 1, "sesquihydrate": 1.5, "dihydrate": 2, "hemipentahydrate": 2.5, "trihydrate": 3, "tetrahydrate": 4, "pentahydrate": 5, "hexahydrate": 6, "heptahydrate": 7, "octahydrate": 8, "nonahydrate": 9, "decahydrate": 10, "dodecahydrate": 12, "tetradecahydrate": 14, "hexadecahydrate": 16, "octadecahydrate": 18}
	seen := 0
	for _, s := range All() {
		words := strings.Fields(s.Name)
		n, ok := count[words[len(words)-1]]
		if !ok || s.Formula == "" {
			continue
		}
		seen++
		dry, water, ok := strings.Cut(s.Formula, ".")
		if !ok {
			t.Errorf("%s: %s has no water", s.Name, s.Formula)
			continue
		}
		want := equilibrium.MustParseFormula(dry).MolarMass() + n*18.015
		if strings.Count(s.Formula, ".") > 1 && n == math.Trunc(n) { // double salts written with dots
			if !strings.HasSuffix(s.Formula, fmt.Sprintf(".%gH2O", n)) {
				t.Errorf("%s: %s", s.Name, s.Formula)
			}
			continue
		}
		if math.Abs(s.MolarMass-want) > 0.01 {
			t.Errorf("%s: %s with %s weighs %g, want %g", s.Name, dry, water, s.MolarMass, want)
		}
	}
	if seen < 60 {
		t.Errorf("only %d hydrates", seen)
	}
	t.Logf("%d hydrates", seen)
}
