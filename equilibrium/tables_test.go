package equilibrium

import (
	"math"
	"strings"
	"testing"
)

// These tests read like promises about tables/*.csv.

func TestTablesAreLargeEnough(t *testing.T) {
	db := Default()
	for _, c := range []struct {
		what      string
		got, want int
	}{
		{"components", len(db.Components), 52},
		{"dissolved species", len(db.Species), 300},
		{"phases", len(db.Phases), 190},
		{"gases", len(db.Gases), 4},
		{"interactions", len(db.Interactions), 80},
	} {
		t.Logf("%d %s", c.got, c.what)
		if c.got < c.want {
			t.Errorf("%d %s, want at least %d", c.got, c.what, c.want)
		}
	}
	for _, name := range []string{"CO2", "NH3", "H2S", "SO2"} {
		found := false
		for _, g := range db.Gases {
			found = found || g.Name == name
		}
		if !found {
			t.Errorf("gas %s is not in the tables", name)
		}
	}
}

// A component's formula and charge must agree with its name, unless the name is
// a word such as Acetate^-.
func TestComponentsAgreeWithTheirNames(t *testing.T) {
	for _, c := range Default().Components {
		if c.MolarMass <= 0 {
			t.Errorf("%s has no molar mass", c.Name)
		}
		body, charge, _ := strings.Cut(c.Name, "^")
		f, err := ParseFormula(c.Name)
		if err != nil { // an organic word: only its charge can be compared
			z, err := parseCharge(charge)
			if err != nil || z != c.Charge || len(body) < 3 {
				t.Errorf("%s: charge %g in the table", c.Name, c.Charge)
			}
			continue
		}
		if f.Charge != c.Charge || !sameCounts(f.Counts, c.Formula.Counts) {
			t.Errorf("%s: the table says %s with charge %g", c.Name, c.Formula.Text, c.Charge)
		}
	}
}

func sameCounts(a, b map[string]float64) bool {
	if len(a) != len(b) {
		return false
	}
	for e, n := range a {
		if math.Abs(n-b[e]) > 1e-9 {
			return false
		}
	}
	return true
}

// ligands are the words that stand in species names for an organic ion.
var ligands = []string{"Acetate", "Oxalate", "Citrate", "Tartrate", "Lactate", "Gluconate", "Formate",
	"Benzoate", "Phthalate", "Glycinate", "EDTA", "NTA"}

// speciesFormula reads the composition that the name of a species claims, with
// the formula of the organic ion put in for its word.
func speciesFormula(db *Database, name string) (Formula, error) {
	for _, word := range ligands {
		at := strings.Index(name, word)
		if at < 0 {
			continue
		}
		for _, c := range db.Components {
			if strings.HasPrefix(c.Name, word+"^") {
				return ParseFormula(name[:at] + "(" + c.Formula.Text + ")" + name[at+len(word):])
			}
		}
	}
	return ParseFormula(name)
}

func TestEverySpeciesBalances(t *testing.T) {
	db := Default()
	for _, s := range db.Species {
		name := s.Name
		// (Oxalate)2 keeps its own brackets.
		for _, word := range ligands {
			name = strings.Replace(name, "("+word+")", word, 1)
		}
		f, err := speciesFormula(db, name)
		if err != nil {
			t.Errorf("%s: %v", s.Name, err)
			continue
		}
		if f.Charge != s.Charge {
			t.Errorf("%s has charge %g in the table", s.Name, s.Charge)
		}
		if err := db.Balance(s.Parts, f.Counts, s.Charge); err != nil {
			t.Errorf("%s: %v", s.Name, err)
		}
	}
}

func TestEveryPhaseBalances(t *testing.T) {
	db := Default()
	for _, p := range db.Phases {
		f, err := ParseFormula(p.Formula)
		if err != nil {
			t.Errorf("%s: %v", p.Name, err)
			continue
		}
		if err := db.Balance(p.Parts, f.Counts, 0); err != nil {
			t.Errorf("%s: %v", p.Name, err)
		}
		if math.Abs(f.MolarMass()-p.MolarMass) > 1e-9 {
			t.Errorf("%s: molar mass %g, its formula gives %g", p.Name, p.MolarMass, f.MolarMass())
		}
	}
}

// constant is what every row with a log K is asked for.
type constant struct {
	what string
	k    *LogK
	o    *Origin
}

func constants(db *Database) []constant {
	var out []constant
	for _, s := range db.Species {
		if len(s.Parts) == 1 && s.Parts[0].Component == s.Name {
			continue // a component: log K is 0 by definition
		}
		out = append(out, constant{"species " + s.Name, &s.LogK, &s.Origin})
	}
	for _, p := range db.Phases {
		out = append(out, constant{"phase " + p.Name, &p.LogK, &p.Origin})
	}
	for _, g := range db.Gases {
		out = append(out, constant{"gas " + g.Name, &g.LogK, &g.Origin})
	}
	return out
}

func TestEveryConstantHasSourceRangeAndUncertainty(t *testing.T) {
	for _, c := range constants(Default()) {
		switch {
		case len(c.o.Source) < 8:
			t.Errorf("%s: source %q", c.what, c.o.Source)
		case c.o.Basis == "":
			t.Errorf("%s: does not say how the figure was come by", c.what)
		case !(c.k.MinC <= c.k.MaxC) || c.k.MinC < -50 || c.k.MaxC > 400:
			t.Errorf("%s: range %g to %g °C", c.what, c.k.MinC, c.k.MaxC)
		case !(c.k.Uncertainty > 0) || c.k.Uncertainty > 6:
			t.Errorf("%s: uncertainty %g", c.what, c.k.Uncertainty)
		case math.IsNaN(c.k.At25C):
			t.Errorf("%s: no value at 25 °C", c.what)
		}
	}
}

// The coefficients and the column for 25 °C are two ways of saying one thing;
// where a range does not reach 25 °C the constant goes on from its limit.
func TestCoefficientsAgreeWith25C(t *testing.T) {
	for _, c := range constants(Default()) {
		if at := c.k.At(tempRefK); math.Abs(at-c.k.At25C) > 0.05 {
			t.Errorf("%s: coefficients give %.3f at 25 °C, the column says %.3f", c.what, at, c.k.At25C)
		}
	}
}

// A wrong sign or a slipped digit in a coefficient shows as a constant that runs
// away: none in the tables moves by more than 0.3 per kelvin within 0 to 100 °C.
func TestConstantsAreSmoothFrom0To100C(t *testing.T) {
	for _, c := range constants(Default()) {
		last := c.k.At(ZeroCelsius)
		for tempC := 5.0; tempC <= 100; tempC += 5 {
			now := c.k.At(tempC + ZeroCelsius)
			if math.IsNaN(now) || math.Abs(now-last) > 1.5 {
				t.Errorf("%s: log K goes from %.2f to %.2f between %g and %g °C", c.what, last, now, tempC-5, tempC)
				break
			}
			last = now
		}
	}
}

func TestPhaseNamesAreUnique(t *testing.T) {
	owner := map[string]string{}
	for _, p := range Default().Phases {
		for _, name := range append([]string{p.Name}, p.Synonyms...) {
			key := foldName(name)
			if name == "" || owner[key] != "" {
				t.Errorf("%q names both %s and %s", name, owner[key], p.Name)
			}
			owner[key] = p.Name
		}
	}
}

// One solid under two spellings would have the same reaction and nearly the same
// constant. Crystal forms of one formula differ in log K.
func TestNoPhaseIsListedTwice(t *testing.T) {
	db := Default()
	for i, a := range db.Phases {
		fa, err := ParseFormula(a.Formula)
		if err != nil {
			t.Fatal(err)
		}
		for _, b := range db.Phases[i+1:] {
			fb, err := ParseFormula(b.Formula)
			if err != nil {
				t.Fatal(err)
			}
			if !sameCounts(fa.Counts, fb.Counts) {
				continue
			}
			if a.Formula != b.Formula {
				t.Errorf("%s and %s: one composition written %s and %s", a.Name, b.Name, a.Formula, b.Formula)
			}
			if a.LogK.At25C == b.LogK.At25C && a.LogK.C == b.LogK.C {
				t.Errorf("%s and %s are the same solid", a.Name, b.Name)
			}
		}
	}
}

func TestHotPhasesHaveATemperature(t *testing.T) {
	for _, p := range Default().Phases {
		switch {
		case p.Forms == FormsHot && !(p.FormsAboveC > 25 && p.FormsAboveC <= 100):
			t.Errorf("%s forms above %g °C", p.Name, p.FormsAboveC)
		case p.Forms == FormsHot && p.Note == "":
			t.Errorf("%s: no reason for %g °C", p.Name, p.FormsAboveC)
		case p.Forms != FormsHot && p.FormsAboveC != 0:
			t.Errorf("%s is %v and has a temperature", p.Name, p.Forms)
		}
	}
}

func TestInteractionsReferToExistingIons(t *testing.T) {
	db := Default()
	seen := map[[2]string]bool{}
	for _, p := range db.Interactions {
		c, okC := db.LookupSpecies(p.Cation)
		a, okA := db.LookupSpecies(p.Anion)
		switch {
		case !okC || !okA:
			t.Errorf("%s %s: no such ion", p.Cation, p.Anion)
			continue
		case c.Charge <= 0 || a.Charge >= 0:
			t.Errorf("%s %s: charges %g and %g", p.Cation, p.Anion, c.Charge, a.Charge)
		case seen[[2]string{p.Cation, p.Anion}]:
			t.Errorf("%s %s: two rows", p.Cation, p.Anion)
		case !(p.Uncertainty > 0) || math.IsNaN(p.Epsilon) || p.Source == "":
			t.Errorf("%s %s: ε %g ± %g, source %q", p.Cation, p.Anion, p.Epsilon, p.Uncertainty, p.Source)
		}
		seen[[2]string{p.Cation, p.Anion}] = true
	}
}

// An association must be counted once: as a species or in ε, never in both,
// unless the two were evaluated together and the row says so.
func TestAssociationIsCountedOnce(t *testing.T) {
	db := Default()
	epsilon := map[[2]string]*IonPairTerm{}
	for _, p := range db.Interactions {
		epsilon[[2]string{p.Cation, p.Anion}] = p
	}
	for _, s := range db.Species {
		if len(s.Parts) != 2 || s.Parts[0].Coefficient <= 0 || s.Parts[1].Coefficient <= 0 {
			continue
		}
		pair := [2]string{s.Parts[0].Component, s.Parts[1].Component}
		p := epsilon[pair]
		if p == nil {
			p = epsilon[[2]string{pair[1], pair[0]}]
		}
		switch {
		case p == nil || p.Cation == "H^+": // an acid is no ion pair
		case p.Note == "":
			t.Errorf("%s is a species, and ε of %s %s is %g without a word why", s.Name, pair[0], pair[1], p.Epsilon)
		case strings.Contains(p.Note, "besides"):
			t.Errorf("%s is a species, and the row of %s %s says there is none", s.Name, pair[0], pair[1])
		}
	}
}

func TestGasesDissolveIntoSpeciesOfTheirName(t *testing.T) {
	for _, g := range Default().Gases {
		if g.Species != g.Name+"(aq)" {
			t.Errorf("gas %s dissolves as %s", g.Name, g.Species)
		}
	}
}

func TestIonsTableRefersToExistingSpecies(t *testing.T) {
	db := Default()
	seen := map[string]bool{}
	err := readTable(tables, "ions.csv", func(r record) error {
		name := r.text("species")
		if _, ok := db.LookupSpecies(name); !ok {
			t.Errorf("line %d: %q is not a species", r.line, name)
		}
		if seen[name] {
			t.Errorf("line %d: %s has two rows", r.line, name)
		}
		seen[name] = true
		v, errV := r.number("v0_cm3_per_mol")
		cp, errCp := r.number("cp0_j_per_mol_k")
		if errV != nil || errCp != nil || math.IsNaN(v) && math.IsNaN(cp) {
			t.Errorf("line %d: %s has neither volume nor heat capacity", r.line, name)
		}
		if math.Abs(v) > 200 || math.Abs(cp) > 400 {
			t.Errorf("line %d: %s: %g cm³/mol, %g J/(mol K)", r.line, name, v, cp)
		}
		if r.text("source") == "" || r.text("basis") == "" {
			t.Errorf("line %d: %s has no source", r.line, name)
		}
		return nil
	})
	if err != nil {
		t.Fatal(err)
	}
	t.Logf("%d of %d species have a row", len(seen), len(db.Species))
}

func TestPhasesByNameAndByFormula(t *testing.T) {
	db := Default()
	for _, c := range []struct{ asked, want string }{
		{"gypsum", "gypsum"}, {"CaSO4.2H2O", "gypsum"}, {"CaSO4·2H2O", "gypsum"}, {"Calcium Sulfate-Dihydrate", "gypsum"},
		{"CaCO3", "calcite"}, {"calcite", "calcite"}, {"brucite", "brucite"}, {"Mg(OH)2", "brucite"},
		{"MgNH4PO4.6H2O", "struvite"}, {"Al(OH)3", "aluminium hydroxide (amorphous)"},
		{"Fe(OH)3", "ferric hydroxide (amorphous)"}, {"AgCl", "silver chloride"}, {"PbCl2", "cotunnite"},
		{"SiO2", "amorphous silica"}, {"CaC2O4.H2O", "whewellite"}, {"CaHPO4.2H2O", "brushite"},
	} {
		p, ok := db.LookupPhase(c.asked)
		if !ok || p.Name != c.want {
			t.Errorf("%q finds %v, want %s", c.asked, p, c.want)
		}
	}
	if p, ok := db.LookupPhase("unobtainium"); ok {
		t.Errorf("found %s", p.Name)
	}
	// Both ways for all: by its name, by each synonym, and among those of its formula.
	for _, p := range db.Phases {
		for _, name := range append([]string{p.Name}, p.Synonyms...) {
			if got, ok := db.LookupPhase(name); !ok || got != p {
				t.Errorf("%q does not find %s", name, p.Name)
			}
		}
		found := false
		for _, q := range db.PhasesOf(p.Formula) {
			found = found || q == p
		}
		if !found {
			t.Errorf("%s does not find %s", p.Formula, p.Name)
		}
	}
}

// Which rows nobody re-read: not a fault, but a user must be able to see them.
func TestRowsThatRestOnMemory(t *testing.T) {
	all := constants(Default())
	var memory []string
	for _, c := range all {
		if c.o.FromMemory {
			memory = append(memory, c.what+": "+c.o.Source)
		}
	}
	epsilon := 0
	for _, p := range Default().Interactions {
		if p.FromMemory {
			epsilon++
		}
	}
	t.Logf("%d of %d constants and %d of %d interactions rest on memory of the publication named", len(memory), len(all), epsilon, len(Default().Interactions))
	if testing.Verbose() {
		t.Log("\n" + strings.Join(memory, "\n"))
	}
	if len(memory) == len(all) || len(memory) == 0 {
		t.Errorf("the column basis is not read: %d of %d", len(memory), len(all))
	}
}
