package catalogue

import (
	"math"
	"strings"
	"testing"

	"dregs/equilibrium"
)

func TestParseBrings(t *testing.T) {
	for cell, want := range map[string]string{
		"Na^+ + H2O - H^+":              "Na^+ 1, H2O 1, H^+ -1",
		"2 Na^+ + 3.3 H4SiO4(aq)":       "Na^+ 2, H4SiO4(aq) 3.3",
		"- H^+ + NH4^+":                 "H^+ -1, NH4^+ 1",
		"":                              "",
		"NH4^+ - H^+":                   "NH4^+ 1, H^+ -1",
		"SO3^2- + 2 H^+ - 1 H2O - 2 Cl": "SO3^2- 1, H^+ 2, H2O -1, Cl -2",
	} {
		parts, err := parseBrings(cell)
		if err != nil || show(parts) != want {
			t.Errorf("%q: got %q, %v, want %q", cell, show(parts), err, want)
		}
	}
	for _, cell := range []string{"Na^+ +", "+ Na^+", "Na^+ Cl^-", "2 + Na^+", "0 Na^+", "1e9 Na^+", "NaN", "-", "Na^+ - - H^+"} {
		if parts, err := parseBrings(cell); err == nil && cell != "NaN" {
			t.Errorf("%q: accepted as %s", cell, show(parts))
		}
	}
}

// Promises of the table of substances.
func TestEntries(t *testing.T) {
	db := equilibrium.Default()
	if n := len(All()); n < 260 {
		t.Errorf("%d substances, want at least 260", n)
	}
	forms := map[string]bool{"crystals": true, "powder": true, "granules": true, "flakes": true, "liquid": true, "solution": true, "slurry": true, "gas": true}
	computed, memory := 0, 0
	for _, s := range All() {
		if !forms[s.Form] {
			t.Errorf("%s: form %q", s.Name, s.Form)
		}
		if s.Source == "" {
			t.Errorf("%s: no source", s.Name)
		}
		if s.FromMemory {
			memory++
		}
		fluid := s.Form == "liquid" || s.Form == "solution" || s.Form == "slurry"
		if !math.IsNaN(s.DensityKgL) && (!fluid || s.DensityKgL < 0.6 || s.DensityKgL > 2.2) {
			t.Errorf("%s (%s): density %g", s.Name, s.Form, s.DensityKgL)
		}
		if s.StrengthWt < 1 && !fluid {
			t.Errorf("%s: a strength below 1 in the form %s", s.Name, s.Form)
		}
		if s.HeatKJPerMol < -400 || s.HeatKJPerMol > 150 {
			t.Errorf("%s: heat %g kJ/mol", s.Name, s.HeatKJPerMol)
		}
		if !s.Computed() {
			if !s.Inert && s.NoData == "" {
				t.Errorf("%s: neither computed, inert nor without data", s.Name)
			}
			continue
		}
		computed++
		f := equilibrium.MustParseFormula(s.Formula)
		if err := db.Balance(s.Parts, f.Counts, f.Charge); err != nil {
			t.Errorf("%s = %s: %v", s.Formula, show(s.Parts), err)
		}
	}
	t.Logf("%d substances, %d computed, %d with figures from memory", len(All()), computed, memory)
}

// The spelling of a formula must be that of the phases, by which the walk knows
// which solid a charge is.
func TestSpelledAsPhases(t *testing.T) {
	db := equilibrium.Default()
	for _, s := range All() {
		if s.StrengthWt < 1 || s.Formula == "" {
			continue
		}
		for _, p := range db.Phases {
			if sameCounts(s.Formula, p.Formula) && len(db.PhasesOf(s.Formula)) == 0 {
				t.Errorf("%s is spelt %s here, %s in the phases", s.Name, s.Formula, p.Formula)
			}
		}
	}
}

// A mineral that bears the name of an entry must be of that formula.
func TestMineralNames(t *testing.T) {
	db := equilibrium.Default()
	// The phases know these by looser names: one hydrate stands there for the salt.
	loose := map[string]bool{"aluminum sulfate": true, "aluminium sulfate octadecahydrate": true, "Al2(SO4)3.18H2O": true, "trisodium phosphate": true}
	for _, p := range db.Phases {
		for _, name := range append([]string{p.Name}, p.Synonyms...) {
			if s, ok := Lookup(name); ok && s.Computed() && !loose[name] && !sameCounts(s.Formula, p.Formula) {
				t.Errorf("%q is %s among the phases, %s (%s) here", name, p.Formula, s.Formula, s.Name)
			}
		}
	}
}

func sameCounts(a, b string) bool {
	f, err1 := equilibrium.ParseFormula(a)
	g, err2 := equilibrium.ParseFormula(b)
	if err1 != nil || err2 != nil || len(f.Counts) != len(g.Counts) {
		return false
	}
	for e, n := range f.Counts {
		if math.Abs(g.Counts[e]-n) > 1e-9 {
			return false
		}
	}
	return true
}

func TestLoadRefuses(t *testing.T) {
	const head = "name,formula,synonyms,form,strength_wt,density_kg_l,brings,heat_kj_mol,hazards,no_data,inert,source,basis,note\n"
	for row, want := range map[string]string{
		"a,NaCl,,powder,1,,Na^+ + Cl^-,,,,,s,,\nA,KCl,,powder,1,,K^+ + Cl^-,,,,,s,,": "taken",
		",NaCl,,powder,1,,Na^+ + Cl^-,,,,,s,,":                                       "no name",
		"a,Xx,,powder,1,,Na^+,,,,,s,,":                                               "not an element",
		"a,NaCl,,powder,2,,Na^+ + Cl^-,,,,,s,,":                                      "strength",
		"a,NaCl,,powder,1,heavy,Na^+ + Cl^-,,,,,s,,":                                 "density",
		"a,NaCl,,powder,1,,Na^+ + Cl^-,,smelly,,,s,,":                                "hazard class",
		"a,NaCl,,powder,1,,,,,,,s,,":                                                 "exactly one",
		"a,NaCl,,powder,1,,Na^+ + Cl^-,,,oxidiser,,s,,":                              "exactly one",
		"a,NaCl,,powder,1,,Na^+ + Cl^-,,,,yes,s,,":                                   "exactly one",
		"a,NaCl,,powder,1,,,,,because,yes,s,,":                                       "exactly one",
		"a,NaCl,,powder,1,,Na^+ Cl^-,,,,,s,,":                                        "no sign",
	} {
		if _, err := load(head + row); err == nil || !strings.Contains(err.Error(), want) {
			t.Errorf("%s: %v, want %q", row, err, want)
		}
	}
}
