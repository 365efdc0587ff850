package catalogue

import (
	"math"
	"slices"
	"strings"
	"testing"
)

func TestClasses(t *testing.T) {
	seen := map[string]bool{}
	for _, c := range Classes() {
		if seen[c.Name] || c.Meaning == "" || c.Name != strings.ToLower(c.Name) {
			t.Errorf("class %q: %q", c.Name, c.Meaning)
		}
		seen[c.Name] = true
	}
	if _, ok := Meaning("no such class"); ok {
		t.Error("a class that is not there has a meaning")
	}
	used := map[string]bool{}
	for _, s := range All() {
		for _, h := range s.Hazards {
			used[h] = true
			if !seen[h] {
				t.Errorf("%s: class %q is not in the list", s.Name, h)
			}
		}
	}
	for c := range seen {
		if !used[c] {
			t.Errorf("no substance is of class %q", c)
		}
	}
}

func TestPairs(t *testing.T) {
	type key struct {
		a, b    string
		ordered bool
	}
	seen := map[key]bool{}
	for _, p := range Pairs() {
		for _, c := range []string{p.A, p.B} {
			if _, ok := Meaning(c); !ok {
				t.Errorf("%s with %s: no class %q", p.A, p.B, c)
			}
		}
		if p.Gives == "" || p.Source == "" || !strings.HasSuffix(p.Caution, ".") {
			t.Errorf("%s with %s: %+v", p.A, p.B, p)
		}
		if !math.IsNaN(p.AboveC) && (p.AboveC < 0 || p.AboveC > 100) {
			t.Errorf("%s with %s: above %g", p.A, p.B, p.AboveC)
		}
		a, b := p.A, p.B
		if !p.Ordered && a > b {
			a, b = b, a
		}
		if seen[key{a, b, p.Ordered}] {
			t.Errorf("%s with %s: twice", p.A, p.B)
		}
		seen[key{a, b, p.Ordered}] = true
	}
}

// The pairs that common practice keeps apart must be found from the names that a
// recipe would use.
func TestPairsBySubstance(t *testing.T) {
	for _, c := range []struct{ a, b, gives string }{
		{"sulfuric acid", "sodium cyanide", "hydrogen cyanide"},
		{"hydrochloric acid", "sodium sulfide nonahydrate", "hydrogen sulfide"},
		{"hydrochloric acid", "bleach", "chlorine"},
		{"citric acid", "sodium hypochlorite solution", "chlorine"},
		{"ferric chloride solution", "bleach", "chlorine"},
		{"ammonia solution", "bleach", "chloramines"},
		{"ammonium sulfate", "bleach", "chloramines"},
		{"ammonium chloride", "caustic soda 50 %", "ammonia"},
		{"ammonium sulfate", "quicklime", "ammonia"},
		{"sulfuric acid", "sodium sulfite", "sulfur dioxide"},
		{"acetic acid", "sodium metabisulfite", "sulfur dioxide"},
		{"sulfuric acid", "sodium azide", "hydrogen azide"},
		{"sulfuric acid", "sodium fluoride", "hydrogen fluoride"},
		{"phosphoric acid", "limestone", "carbon dioxide"},
		{"nitric acid", "soda ash", "carbon dioxide"},
		{"zinc dust", "hydrochloric acid", "hydrogen"},
		{"aluminium powder", "caustic soda", "hydrogen"},
		{"water", "sulfuric acid", "boiling"},
		{"caustic soda flakes", "water", "boiling"},
		{"nitric acid", "ethanol", "fire"},
		{"silver nitrate", "ammonia solution", "explosive"},
		{"hydrogen peroxide 35 %", "glycerol", "fire"},
		{"sodium nitrite", "sulfamic acid", "nitrogen oxides"},
		{"sodium chlorite", "hydrochloric acid", "chlorine dioxide"},
		{"potassium permanganate", "glycerol", "fire"},
		{"hydrogen peroxide 35 %", "ferrous sulfate", "oxygen"},
		{"silver nitrate", "sodium azide", "explosive"},
		{"sodium metabisulfite", "sodium cyanide", "hydrogen cyanide"},
		{"sodium nitrate", "sulfuric acid", "nitric acid"},
		{"salt", "sulfuric acid", "hydrogen chloride"},
		{"citric acid", "nitric acid", "fire"},
	} {
		a, b := find(t, c.a), find(t, c.b)
		gives := func(p Pair) bool { return strings.Contains(p.Gives, c.gives) }
		if !slices.ContainsFunc(Clashes(a.Hazards, b.Hazards, 60), gives) {
			t.Errorf("%s with %s: no pair gives %s", c.a, c.b, c.gives)
		}
	}
	// And harmless company stays silent.
	for _, c := range [][2]string{{"sodium chloride", "water"}, {"Epsom salt", "gypsum"}, {"sodium sulfate", "sulfuric acid 10 %"}, {"sodium acetate", "acetic acid"}, {"KH2PO4", "Na2HPO4"}, {"boric acid", "nickel sulfate hexahydrate"}, {"calcium nitrate tetrahydrate", "magnesium sulfate heptahydrate"}, {"ammonium sulfate", "sulfuric acid"}, {"citric acid", "trisodium citrate dihydrate"}, {"water", "hydrochloric acid"},
		// Routine: neutralising, pH by acid in baths and nutrient liquors, bisulfite beside sulfite.
		{"sulfuric acid", "caustic soda 50 %"}, {"sulfuric acid", "hydrated lime"}, {"nitric acid", "calcium nitrate tetrahydrate"},
		{"potassium nitrate", "ferric sodium EDTA"}, {"sodium bisulfite", "sodium sulfite"}, {"sodium nitrite", "borax"}} {
		a, b := find(t, c[0]), find(t, c[1])
		for _, p := range append(Clashes(a.Hazards, b.Hazards, 20), Clashes(b.Hazards, a.Hazards, 20)...) {
			t.Errorf("%s with %s: %s", c[0], c[1], p.Gives)
		}
	}
}

// The order and the temperature count where practice says so.
func TestClashesOrder(t *testing.T) {
	water, acid, caustic := []string{"water"}, find(t, "sulfuric acid").Hazards, find(t, "caustic soda").Hazards
	for _, c := range []struct {
		what     string
		in, into []string
		tempC    float64
		want     int
	}{
		{"water into acid", water, acid, 20, 1},
		{"acid into water", acid, water, 20, 0},
		{"caustic flakes into cold water", caustic, water, 15, 0},
		{"caustic flakes into hot water", caustic, water, 60, 1},
		{"water onto caustic flakes", water, caustic, 15, 1},
		{"sulfuric acid into a nickel chloride bath", acid, find(t, "nickel chloride hexahydrate").Hazards, 50, 0},
		{"nitric acid into a citrate liquor", find(t, "nitric acid").Hazards, find(t, "trisodium citrate dihydrate").Hazards, 25, 0},
	} {
		if got := Clashes(c.in, c.into, c.tempC); len(got) != c.want {
			t.Errorf("%s: %d pairs %v, want %d", c.what, len(got), got, c.want)
		}
	}
}

func TestAssumed(t *testing.T) {
	for name, want := range map[string]string{
		"magnesium sulfate":              "heptahydrate",
		"Copper Sulfate":                 "CuSO4.5H2O",
		"sulfuric acid":                  "96 wt%",
		"citric acid":                    "citric acid monohydrate",
		"nickel sulfate":                 "nickel sulfate hexahydrate",
		"caustic soda":                   "sodium hydroxide 50 %",
		"magnesium sulfate heptahydrate": "",
		"Epsom salt":                     "",
		"sulfuric acid 96 %":             "",
		"MgSO4":                          "",
		"sodium chloride":                "",
		"gypsum":                         "",
		"nothing known":                  "",
	} {
		got := Assumed(name)
		if (got == "") != (want == "") || !strings.Contains(got, want) {
			t.Errorf("%q: %q, want %q", name, got, want)
		}
	}
}
