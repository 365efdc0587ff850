package checks

import (
	"fmt"
	"path/filepath"
	"reflect"
	"testing"

	"github.com/rogpeppe/go-internal/txtar"

	"dregs/recipe"
)

// Where a waiver stands, it accepts what it names and nothing else; one that
// accepts nothing is told.
func TestWaivers(t *testing.T) {
	const form = `recipe "invented gypsum" { revision = "A" }
tank "T-1" { capacity = "3 m3" }
%s
stage "make" {
  charge "water" { mass = "1000 kg" }
  charge "calcium chloride dihydrate" { mass = "30 kg" }
  charge "sodium sulfate" {
    mass = "29 kg"
    %s
  }
  %s
}
`
	waiver := func(code, phase string) string {
		return fmt.Sprintf("waive %q {\n phase = %q\n because = \"invented trial\"\n}\n", code, phase)
	}
	for name, c := range map[string]struct {
		recipe, step, stage string
		waived              bool
		unused              int
	}{
		"none":              {"", "", "", false, 0},
		"of the recipe":     {waiver("SOL-01", "gypsum"), "", "", true, 0},
		"of the step":       {"", waiver("SOL-01", "gypsum"), "", true, 0},
		"of the stage":      {"", "", waiver("SOL-01", "gypsum"), true, 0},
		"by formula":        {"", "", waiver("SOL-01", "CaSO4.2H2O"), true, 0},
		"of another phase":  {"", "", waiver("SOL-01", "calcite"), false, 1},
		"of another code":   {"", "", waiver("SAT-02", "gypsum"), false, 1},
		"twice, one enough": {waiver("SOL-01", "gypsum"), waiver("SAT-03", "gypsum"), "", true, 1},
	} {
		t.Run(name, func(t *testing.T) {
			found, unused := false, 0
			findings := findingsOf(t, "waivers", fmt.Sprintf(form, c.recipe, c.step, c.stage))
			for _, f := range findings {
				if f.Code == "SOL-01" && f.Phase == "gypsum" {
					found = true
					if (f.Waived != nil) != c.waived {
						t.Errorf("waived is %v, want %v", f.Waived != nil, c.waived)
					}
				}
				if f.Code == "RCP-07" {
					unused++
				}
			}
			if !found {
				t.Error("gypsum is not found")
			}
			if unused != c.unused {
				t.Errorf("%d unused waivers told, want %d", unused, c.unused)
			}
			if c.waived && Worst(findings) == recipe.Stop {
				t.Error("a waived finding counts")
			}
		})
	}
}

// Same input, same findings: in order, word for word.
func TestFindingsAreTheSameEachTime(t *testing.T) {
	archive, err := txtar.ParseFile(filepath.Join("testdata", "SOL-06.txtar"))
	if err != nil {
		t.Fatal(err)
	}
	text := string(archive.Files[0].Data)
	list := func() (out []string) {
		for _, f := range findingsOf(t, "again", text) {
			out = append(out, fmt.Sprint(f.At.Line, f.Code, f.Level, f.Phase, f.Message, f.Limits, f.Evidence, f.Remedies))
		}
		return out
	}
	first := list()
	for range 10 {
		if again := list(); !reflect.DeepEqual(first, again) {
			t.Fatalf("%q\nthen %q", first, again)
		}
	}
}
