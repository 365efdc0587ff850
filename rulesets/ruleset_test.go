package rulesets

import (
	"os"
	"path/filepath"
	"reflect"
	"strings"
	"testing"

	"dregs/recipe"
)

var codes = []string{"SOL-01", "SOL-04", "SAT-02"}

func load(t testing.TB, text string) (*Set, []recipe.Problem) {
	path := filepath.Join(t.TempDir(), "site.rules.hcl")
	if err := os.WriteFile(path, []byte(text), 0o600); err != nil {
		t.Fatal(err)
	}
	s := Standard()
	return s, s.Load(path, codes)
}

func TestSiteChangesOnlyWhatItNames(t *testing.T) {
	s, problems := load(t, `ruleset "invented site" { because = "bright finish" }
limits {
  haze            = "1 mg/L"
  zone_sparing    = 0.1
  dissolve_margin = "8 %"
  gas             = "0.5 m3"
}
levels {
  SOL-04 = "stop"
}
`)
	if len(problems) > 0 {
		t.Fatal(problems)
	}
	for name, want := range map[string]float64{"haze": 1e-6, "zone_sparing": 0.1, "dissolve_margin": 0.08, "gas": 500, "feed_index": 0.5, "imbalance_caution": 0.1} {
		if got := s.Limits[name].Value; got < want*(1-1e-12) || got > want*(1+1e-12) {
			t.Errorf("%s is %g, want %g", name, got, want)
		}
	}
	if len(s.Levels) != 1 || s.Levels["SOL-04"] != recipe.Stop {
		t.Errorf("levels %v", s.Levels)
	}
	if len(s.Limits) != len(Standard().Limits) {
		t.Error("a limit was lost or gained")
	}
}

func TestFaultsAtTheirLine(t *testing.T) {
	const head = "ruleset \"invented\" {}\n"
	for _, c := range []struct {
		text, says, nearest, expected string
		line, column                  int
	}{
		{head + "limits {\n  hase = \"1 mg/L\"\n}\n", `no limit "hase"`, "haze", "", 3, 3},
		{head + "limits { haze = 5 }\n", "no unit", "", "", 2, 17},
		{head + "limits { haze = \"5 kg\" }\n", "measures mass", "", "", 2, 17},
		{head + "limits { feed_index = -1 }\n", "negative", "", "0 or more", 2, 23},
		{head + "limits { haze = \"5 mg/L +- 1 mg/L\" }\n", "no tolerance", "", "5 mg/L", 2, 17},
		{head + "limits { haze = upper(\"x\") }\n", "cannot be read", "", "5 mg/L", 2, 17},
		{head + "levels { SOL-O1 = \"stop\" }\n", `no code "SOL-O1"`, "SOL-01", "", 2, 10},
		{head + "levels { XYZ-77 = \"stop\" }\n", `no code "XYZ-77"`, "", "SOL-04", 2, 10},
		{head + "levels { SOL-01 = \"halt\" }\n", `"halt" is no level`, "", "caution", 2, 19},
		{head + "limit { haze = \"1 mg/L\" }\n", `no block "limit"`, "limits", "", 2, 1},
		{head + "limits {}\nlimits {}\n", "second limits", "", "", 3, 1},
		{head + "limits \"a\" {}\n", "takes no name", "", "", 2, 8},
		{head + "haze = \"1 mg/L\"\n", "outside a block", "", "", 2, 1},
		{"limits {}\n", "no ruleset block", "", "ruleset", 1, 1},
		{head + "limits {\n  haze = \"1 mg/L\n}\n", "does not end on its line", "", "", 3, 17},
		{head + strings.Repeat("[", 200), "nested", "", "", 2, 65},
	} {
		s, problems := load(t, c.text)
		if len(problems) == 0 {
			t.Errorf("%q is taken", c.text)
			continue
		}
		p := problems[0]
		if !p.Fatal || p.Code == "" || !strings.Contains(p.Message, c.says) || p.Nearest != c.nearest || !strings.Contains(p.Expected, c.expected) || p.At.Line != c.line || p.At.Column != c.column {
			t.Errorf("%q: %d:%d %s %s (expected %q, nearest %q)", c.text, p.At.Line, p.At.Column, p.Code, p.Message, p.Expected, p.Nearest)
		}
		if !reflect.DeepEqual(s, Standard()) {
			t.Errorf("%q changes the set", c.text)
		}
	}
}

func TestAllFaultsOfAFileInItsOrder(t *testing.T) {
	_, problems := load(t, "ruleset \"invented\" {}\nlevels {\n  SOL-99 = \"stop\"\n}\nlimits {\n  hase = 1\n  gas = \"1 kg\"\n}\n")
	var lines []int
	for _, p := range problems {
		lines = append(lines, p.At.Line)
	}
	if !reflect.DeepEqual(lines, []int{3, 6, 7}) {
		t.Errorf("faults at lines %v", lines)
	}
}

func TestAbsentFile(t *testing.T) {
	if p := Standard().Load(filepath.Join(t.TempDir(), "none.rules.hcl"), codes); len(p) != 1 || !strings.Contains(p[0].Message, "there is no file") {
		t.Error(p)
	}
}

func FuzzLoad(f *testing.F) {
	f.Add(string(standardText))
	f.Add("ruleset \"a\" {}\nlimits { haze = \"1 mg/L\" }\nlevels { SOL-01 = \"note\" }\n")
	f.Fuzz(func(t *testing.T, text string) {
		s := Standard()
		body, problem := recipe.Parse("site.rules.hcl", kind, []byte(text))
		if problem != nil {
			return
		}
		if problems := s.take(body, "site.rules.hcl", codes); len(problems) > 0 && !reflect.DeepEqual(s, Standard()) {
			t.Error("a faulty file changes the set")
		}
	})
}
