package checks

import (
	"os"
	"path/filepath"
	"testing"

	"dregs/recipe"
	"dregs/rulesets"
)

func TestEveryLimitOfTheRulesetHasItsField(t *testing.T) {
	set := rulesets.Standard()
	places := (&Thresholds{}).places()
	for name := range places {
		if _, ok := set.Limits[name]; !ok {
			t.Errorf("the standard ruleset has no limit %s", name)
		}
	}
	for name := range set.Limits {
		if _, ok := places[name]; !ok {
			t.Errorf("limit %s belongs to no rule", name)
		}
	}
}

// A ruleset of a site decides levels and limits: the same recipe, two rulesets.
func TestSiteRulesetChangesTheVerdict(t *testing.T) {
	const text = `recipe "invented gypsum" { revision = "A" }
tank "T-1" { capacity = "3 m3" }
stage "make" {
  charge "water" { mass = "1000 kg" }
  charge "calcium chloride dihydrate" { mass = "30 kg" }
  charge "sodium sulfate" { mass = "29 kg" }
}
`
	level := func(rules string) recipe.Level {
		t.Helper()
		path := filepath.Join(t.TempDir(), "site.rules.hcl")
		if err := os.WriteFile(path, []byte("ruleset \"invented site\" {}\n"+rules), 0o600); err != nil {
			t.Fatal(err)
		}
		limits, problems := ReadThresholds(path)
		if len(problems) > 0 {
			t.Fatal(problems)
		}
		for _, f := range findingsUnder(t, "ruleset", text, limits) {
			if f.Code == "SOL-01" && f.Phase == "gypsum" {
				return f.Level
			}
		}
		return 0
	}
	for rules, want := range map[string]recipe.Level{
		"":                                  recipe.Stop,
		"levels { SOL-01 = \"caution\" }\n": recipe.Caution,
		"limits { haze = \"100 g/L\" }\n":   recipe.Note,
		"limits { haze = \"100 g/L\" }\nlevels { SOL-01 = \"caution\" }\n": recipe.Note,
		"limits { zone_sparing = \"10\" }\n":                               0, // then it is SAT-02
	} {
		if got := level(rules); got != want {
			t.Errorf("%q: gypsum is a %v, want %v", rules, got, want)
		}
	}
	if _, problems := ReadThresholds(filepath.Join("testdata", "none.rules.hcl")); len(problems) != 1 {
		t.Errorf("an absent ruleset: %v", problems)
	}
}
