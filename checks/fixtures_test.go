package checks

import (
	"fmt"
	"math"
	"os"
	"path/filepath"
	"regexp"
	"strconv"
	"strings"
	"testing"
	"time"

	"github.com/rogpeppe/go-internal/txtar"

	"dregs/equilibrium"
	"dregs/equilibrium/catalogue"
	"dregs/recipe"
	"dregs/recipe/trace"
)

// wanted is an expectation written beside a step:
//
//	# finds SOL-01 gypsum 29 kg ± 10 %; TRUST-01
type wanted struct {
	line      int
	code      string
	phase     string
	grams     float64
	tolerance float64
	met       bool
}

var wantedForm = regexp.MustCompile(`^([A-Z]+-[0-9]+)(?: ([^0-9#]*[^0-9# ]))?(?: ([0-9.]+) (kg|g) ± ([0-9]+) %)?\s*$`)

func wantedIn(t *testing.T, text string) []wanted {
	t.Helper()
	var out []wanted
	for i, line := range strings.Split(text, "\n") {
		_, list, ok := strings.Cut(line, "# finds ")
		if !ok {
			continue
		}
		for _, text := range strings.Split(list, "; ") {
			m := wantedForm.FindStringSubmatch(text)
			if m == nil {
				t.Fatalf("line %d: %q is no expectation", i+1, text)
			}
			w := wanted{line: i + 1, code: m[1], phase: strings.TrimSpace(m[2])}
			if m[3] != "" {
				w.grams, _ = strconv.ParseFloat(m[3], 64)
				if m[4] == "kg" {
					w.grams *= 1000
				}
				w.tolerance, _ = strconv.ParseFloat(m[5], 64)
			}
			out = append(out, w)
		}
	}
	return out
}

func readOptions() recipe.Options {
	db := equilibrium.Default()
	return recipe.Options{
		Today: time.Date(2026, 12, 1, 12, 0, 0, 0, time.UTC),
		KnownSubstance: func(name string) bool {
			if _, ok := catalogue.Lookup(name); ok {
				return true
			}
			_, err := catalogue.Decompose(db, name)
			return err == nil
		},
		Substances: catalogue.Names,
		KnownPhase: func(name string) bool { _, ok := db.LookupPhase(name); return ok },
		Phases:     db.PhaseNames,
	}
}

func findingsOf(t *testing.T, name, text string) []Finding {
	t.Helper()
	return findingsUnder(t, name, text, nil)
}

func findingsUnder(t *testing.T, name, text string, limits *Thresholds) []Finding {
	t.Helper()
	r, problems := recipe.LoadBytes(filepath.Join("testdata", name), []byte(text), readOptions())
	for _, p := range problems {
		if p.Fatal {
			t.Fatalf("%s:%d:%d: %s (expected %s, nearest %s)", name, p.At.Line, p.At.Column, p.Message, p.Expected, p.Nearest)
		}
	}
	tr := trace.Walk(r, trace.Options{})
	for _, p := range tr.Problems {
		t.Fatalf("%s:%d: the walk: %s", name, p.At.Line, p.Message)
	}
	return Run(tr, problems, limits)
}

// Every rule has an archive with three recipes: one that trips it, one that nearly
// does and one that must be silent. What is expected stands beside the step; any
// other stop or caution, of whatever rule, is a fault. The amounts come from handbook
// solubilities, as told in the recipes, not from the program.
func TestRulesOnTheirRecipes(t *testing.T) {
	for _, rule := range append(append([]*Rule{}, All...), &Rule{Code: "RCP-06"}, &Rule{Code: "RCP-07"}) {
		path := filepath.Join("testdata", rule.Code+".txtar")
		if _, err := os.Stat(path); err != nil {
			t.Errorf("rule %s has no recipes", rule.Code)
			continue
		}
		archive, err := txtar.ParseFile(path)
		if err != nil {
			t.Fatal(err)
		}
		seen := map[string]bool{}
		for _, file := range archive.Files {
			t.Run(rule.Code+"/"+file.Name, func(t *testing.T) {
				seen[file.Name] = true
				text := string(file.Data)
				expected := wantedIn(t, text)
				own := 0
				for _, w := range expected {
					if w.code == rule.Code {
						own++
					}
				}
				if trips := strings.HasPrefix(file.Name, "trips"); trips != (own > 0) {
					t.Errorf("%d expectations of the rule itself", own)
				}
				compare(t, rule, findingsOf(t, rule.Code+" "+file.Name, text), expected)
			})
		}
		for _, name := range []string{"trips.recipe.hcl", "near.recipe.hcl", "silent.recipe.hcl"} {
			if !seen[name] {
				t.Errorf("rule %s has no %s", rule.Code, name)
			}
		}
	}
}

func compare(t *testing.T, rule *Rule, findings []Finding, expected []wanted) {
	t.Helper()
	for _, f := range findings {
		if f.Waived != nil {
			continue
		}
		ok := false
		for i := range expected {
			w := &expected[i]
			if w.line != f.At.Line || w.code != f.Code || w.phase != "" && w.phase != f.Phase {
				continue
			}
			if w.tolerance > 0 && !(math.Abs(f.AmountG/w.grams-1) <= w.tolerance/100) {
				t.Errorf("line %d: %s of %s, want %s ± %g %%", f.At.Line, mass(f.AmountG), f.Phase, mass(w.grams), w.tolerance)
			}
			ok, w.met = true, true
		}
		if !ok && (f.Level >= recipe.Caution || strings.HasPrefix(f.Code, "RCP")) {
			t.Errorf("not expected: line %d %s %s: %s", f.At.Line, f.Level, f.Code, f.Message)
		}
	}
	for _, w := range expected {
		if !w.met {
			var list []string
			for _, f := range findings {
				list = append(list, fmt.Sprintf("line %d %s %s %s: %s", f.At.Line, f.Level, f.Code, f.Phase, f.Message))
			}
			t.Errorf("line %d: %s %s is not found; found:\n%s", w.line, w.code, w.phase, strings.Join(list, "\n"))
		}
	}
}

func TestEveryRuleHasItsText(t *testing.T) {
	for i, r := range All {
		if r.Title == "" || len(r.Text) < 80 || r.Level == 0 || r.Run == nil {
			t.Errorf("rule %s is not whole", r.Code)
		}
		if i > 0 && All[i-1].Code >= r.Code {
			t.Errorf("rule %s is out of order", r.Code)
		}
	}
}
