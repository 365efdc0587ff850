package recipe

import (
	"fmt"
	"os"
	"path/filepath"
	"runtime"
	"strings"
	"testing"
	"time"
)

const whole = `recipe "rinse" {
  revision = "C"
  batch    = "1000 L"
}
parameter "final pH" { value = "5.8" }
water "town" {
  temperature = "12 degC"
  ph          = 7.6
  contents = {
    Ca = "82 mg/L", Na = "21 mg/L"
    alkalinity = "210 mg/L as CaCO3"
  }
}
material "caustic 50" {
  contents = { NaOH = "50 wt% +- 0.5 wt%" }
  density  = "1.525 kg/L"
}
tank "T-101" {
  capacity   = "1.5 m3"
  least_fill = "0.2 m3"
  headspace  = { CO2 = "40 Pa" }
  rating     = ["5 degC", "90 degC"]
  heel "town" { volume = "15 L" }
}
tank "T-102" { capacity = "2 m3" }
stage "dissolve" {
  tank = "T-101"
  charge "town" { volume = "800 L" }
  heat { to = "40 degC" }
  dose "caustic 50" {
    mass = "96 g/L"
    over = "20 min"
  }
  adjust {
    ph      = param["final pH"]
    with    = "caustic 50"
    at_most = times("2.5 kg", 2)
  }
  sample { ph = ["5.5", ""] }
  transfer {
    to  = "T-102"
    all = true
  }
  expect "gypsum" { at_least = "80 %" }
  together {
    over = "1 h"
    dose "town" { mass = "1 kg" }
    dose "caustic 50" { mass = "1 kg" }
  }
}
`

func TestWholeRecipe(t *testing.T) {
	r, problems := LoadBytes("x.recipe.hcl", []byte(whole), Options{Root: "."})
	for _, p := range problems {
		t.Errorf("%d:%d %s", p.At.Line, p.At.Column, p.Message)
	}
	if r == nil {
		t.Fatal("nothing read")
	}
	s := r.Stages[0].Steps
	if len(s) != 8 || s[2].Amount.Value != 96 || !s[2].Amount.PerBatch || s[2].Amount.Dimension != Mass {
		t.Fatalf("%d steps, dose %+v", len(s), s[2].Amount)
	}
	if s[3].PH.Value != 5.8 || s[3].AtMost.Value != 5 {
		t.Errorf("adjust %+v %+v", s[3].PH, s[3].AtMost)
	}
	if l := s[4].Limits[0]; l.Low.Value != 5.5 || l.High != nil {
		t.Errorf("limit %+v", l)
	}
	if a := s[0].Amount.At; a.Line != 28 || a.Column != 29 || a.EndColumn != 34 {
		t.Errorf("the amount stands at %d:%d-%d", a.Line, a.Column, a.EndColumn)
	}
	if r.Tanks[0].Headspace.PartialPa["CO2"] != 40 || r.Tanks[0].Heel == nil || s[5].Into != r.Tanks[1] || len(s[7].Doses) != 2 {
		t.Error("tank, transfer or together")
	}
	set, problems := LoadBytes("x.recipe.hcl", []byte(whole), Options{Root: ".", Set: map[string]string{"batch": "2 m3", "final pH": "6.5"}})
	if len(problems) > 0 || set.Stages[0].Steps[2].Amount.Value != 192 || set.Stages[0].Steps[3].PH.Value != 6.5 {
		t.Errorf("--set: %v", problems)
	}
}

// Every fault of a file is told in one run, at its place, with the nearest
// spelling.
func TestProblemsAreToldWithTheirPlaces(t *testing.T) {
	change := func(pairs ...string) string { return strings.NewReplacer(pairs...).Replace(whole) }
	tests := []struct {
		name, text string
		want       []string // line:column code, part of the message or nearest
	}{
		{"three at once", change(`heat { to = "40 degC" }`, `heat { to = 40 }`, `capacity   = "1.5 m3"`, `capasity   = "1.5 m3"`, `"1.525 kg/L"`, `"1.525 kg/X"`),
			[]string{"16:21 RCP-03 is not a unit", "19:3 RCP-02 capacity", "29:15 RCP-03 bare number"}},
		{"unknown tank", change(`to  = "T-102"`, `to  = "T-120"`), []string{"41:11 RCP-02 T-102"}},
		{"unknown material", change(`charge "town"`, `charge "twon"`), []string{"28:10 RCP-02 town"}},
		{"unknown parameter", change(`param["final pH"]`, `param["final PH"]`), []string{"35:15 RCP-02 final pH"}},
		{"step without need", change(`    with    = "caustic 50"`+"\n", ""), []string{"34:3 RCP-04 with"}},
		{"two amounts", change(`mass = "96 g/L"`, "mass = \"96 g/L\"\n    volume = \"3 L\""), []string{"30:3 RCP-04 more than once"}},
		{"into itself", change(`to  = "T-102"`, `to  = "T-101"`), []string{"40:3 RCP-05 comes from"}},
		{"an open quote", change(`"12 degC"`, `"12 degC`), []string{"7:25 RCP-01 does not end"}},
		{"a computed list", change(`["5.5", ""]`, `[for x in ["5.5", ""] : x]`), []string{"39:17 RCP-03 pair"}},
		{"unknown function", change(`times(`, `time(`), []string{"37:15 RCP-02 times"}},
		{"negative mass", change(`"96 g/L"`, `"-96 kg"`), []string{"31:13 RCP-03 negative"}},
	}
	for _, test := range tests {
		known := func(name string) bool { return name == "gypsum" }
		_, problems := LoadBytes("x.recipe.hcl", []byte(test.text), Options{Root: ".", KnownSubstance: known, KnownPhase: known})
		var got []string
		for _, p := range problems {
			if p.Fatal {
				got = append(got, fmt.Sprintf("%d:%d %s %s %s %s", p.At.Line, p.At.Column, p.Code, p.Message, p.Expected, p.Nearest))
			}
		}
		if len(got) != len(test.want) {
			t.Errorf("%s: %d problems, want %d: %q", test.name, len(got), len(test.want), got)
			continue
		}
		for _, w := range test.want {
			place, rest, _ := strings.Cut(w, " RCP")
			code, says, _ := strings.Cut("RCP"+rest, " ")
			ok := false
			for _, g := range got {
				ok = ok || strings.HasPrefix(g, place+" "+code+" ") && strings.Contains(g, says)
			}
			if !ok {
				t.Errorf("%s: want %q in %q", test.name, w, got)
			}
		}
	}
}

// hostile inputs: a plain message, no panic, bounded time and memory.
func TestHostileFiles(t *testing.T) {
	blocks := "recipe \"x\" {}\n" + strings.Repeat("stage \"s\" {\n  hold { for = \"1 min\" }\n}\n", 10000)
	tests := map[string]string{
		"more than a megabyte":   strings.Repeat("# padding\n", 120000),
		"ten thousand blocks":    blocks,
		"brackets 10,000 deep":   "recipe \"x\" { batch = " + strings.Repeat("(", 10000) + "1" + strings.Repeat(")", 10000) + " }",
		"blocks 10,000 deep":     strings.Repeat("stage \"s\" {\n", 10000),
		"templates 10,000 deep":  "recipe \"x\" { batch = " + strings.Repeat("\"${", 10000) + " }",
		"a million signs":        "recipe \"x\" { batch = " + strings.Repeat("-", 500000) + "1 }",
		"a number of digits":     "recipe \"x\" { batch = " + strings.Repeat("9", 100000) + " }",
		"1e400":                  "recipe \"x\" { repeat = 1e400 }",
		"not UTF-8":              "recipe \"\xff\xfe\" {}",
		"a zero byte":            "recipe \"a\x00b\" {}",
		"NaN":                    "recipe \"x\" { batch = \"NaN L\" }",
		"nested loops":           "recipe \"x\" { uses = [for a in [1,2] : [for b in [1,2] : b]] }",
		"a chain of splats":      "recipe \"x\" { batch = a" + strings.Repeat("[*]", 300000) + " }",
		"a chain of indices":     "recipe \"x\" { batch = a" + strings.Repeat("[0]", 300000) + " }",
		"a chain of dots":        "recipe \"x\" { batch = a" + strings.Repeat(".b", 400000) + " }",
		"conditionals":           "recipe \"x\" { batch = " + strings.Repeat("1?1:", 240000) + "1 }",
		"directives":             "recipe \"x\" { batch = \"" + strings.Repeat("%{if 1}", 140000) + "\" }",
		"loops in a key":         "recipe \"x\" {}\nwater \"w\" {\n  contents = { (join([for a in [1,2,3] : [for b in [1,2,3] : b]])) = \"1 mg/L\" }\n}\n",
		"a sum without end":      "recipe \"x\" { batch = " + strings.Repeat("1+", 400000) + "1 }",
		"an empty file":          "",
		"a function calling all": "recipe \"x\" { batch = sum(" + strings.Repeat("\"1 L\",", 5000) + "\"1 L\") }",
	}
	for name, text := range tests {
		t.Run(name, func(t *testing.T) {
			var before, after runtime.MemStats
			runtime.ReadMemStats(&before)
			begin := time.Now()
			_, problems := LoadBytes("x.recipe.hcl", []byte(text), Options{Root: "."})
			fatal := 0
			for _, p := range problems {
				if p.Fatal {
					fatal++
				}
			}
			if fatal == 0 || fatal > mostProblems+1 {
				t.Errorf("%d problems", fatal)
			}
			runtime.ReadMemStats(&after)
			t.Logf("%v, %d MB allocated, first: %s", time.Since(begin).Round(time.Millisecond), (after.TotalAlloc-before.TotalAlloc)>>20, problems[0].Message)
			if time.Since(begin) > 20*time.Second { // a bound against hanging, not a timing
				t.Errorf("%v", time.Since(begin))
			}
			if after.Sys > 500<<20 {
				t.Errorf("%d MB of memory", after.Sys>>20)
			}
		})
	}
}

func TestFilesThatMayNotBeRead(t *testing.T) {
	outside := t.TempDir()
	root := filepath.Join(t.TempDir(), "repo")
	write := func(path, text string) string {
		if err := os.MkdirAll(filepath.Dir(path), 0o755); err != nil {
			t.Fatal(err)
		}
		if err := os.WriteFile(path, []byte(text), 0o644); err != nil {
			t.Fatal(err)
		}
		return path
	}
	if err := os.MkdirAll(filepath.Join(root, ".git"), 0o755); err != nil {
		t.Fatal(err)
	}
	write(filepath.Join(outside, "o.stock.hcl"), `water "w" {}`)
	write(filepath.Join(root, "a.stock.hcl"), "uses = [\"b.stock.hcl\"]\n")
	write(filepath.Join(root, "b.stock.hcl"), "uses = [\"a.stock.hcl\"]\n")
	if err := os.Symlink(filepath.Join(outside, "o.stock.hcl"), filepath.Join(root, "link.stock.hcl")); err != nil {
		t.Fatal(err)
	}
	rel, err := filepath.Rel(root, filepath.Join(outside, "o.stock.hcl"))
	if err != nil {
		t.Fatal(err)
	}
	recipeUsing := func(uses string) string {
		return write(filepath.Join(root, "x.recipe.hcl"), fmt.Sprintf("recipe \"x\" { uses = [%q] }\ntank \"T\" {}\nstage \"s\" {\n  hold { for = \"1 min\" }\n}\n", filepath.ToSlash(uses)))
	}
	for _, test := range []struct{ uses, says string }{
		{rel, "outside the repository"}, {"link.stock.hcl", "outside the repository"}, {filepath.Join(outside, "o.stock.hcl"), "outside the repository"},
		{"a.stock.hcl", "circle"}, {"none.stock.hcl", "there is no file"}, {"x.txt", "not a stock file"},
	} {
		_, problems := Load(recipeUsing(test.uses), Options{})
		found := false
		for _, p := range problems {
			found = found || p.Fatal && strings.Contains(p.Message, test.says)
		}
		if !found {
			t.Errorf("%s: %+v, want %q", test.uses, problems, test.says)
		}
	}
	for path, says := range map[string]string{os.DevNull: "not an ordinary file", root: "is a folder", filepath.Join(root, "none.recipe.hcl"): "there is no file"} {
		if _, problems := Load(path, Options{}); len(problems) != 1 || !strings.Contains(problems[0].Message, says) {
			t.Errorf("%s: %+v", path, problems)
		}
	}
}

// A file that cannot be read hides what follows from it, and nothing else.
func TestWhatFollowsIsNotTold(t *testing.T) {
	text := "recipe \"x\" {\n  uses    = [\"none.stock.hcl\"]\n  rules   = [\"../../out.rules.hcl\"]\n  revison = \"A\"\n}\nstage \"s\" {\n  tank = \"T\"\n  hold { for = \"1 min\" }\n}\n"
	_, problems := LoadBytes(filepath.Join(t.TempDir(), "x.recipe.hcl"), []byte(text), Options{})
	var codes []string
	for _, p := range problems {
		codes = append(codes, p.Code+" "+strings.SplitN(p.Message, " ", 4)[2])
	}
	if len(problems) != 3 {
		t.Errorf("%q", codes)
	}
}

func TestToleranceInPercentIsOfTheNumberWritten(t *testing.T) {
	for text, want := range map[string]float64{"298.15 K +- 1 %": 2.9815, "25 degC +- 10 %": 2.5, "90 degF +- 10 %": 5} {
		q, err := ParseQuantity(text, Temperature)
		if err != nil || q.Minus < want*0.999 || q.Minus > want*1.001 {
			t.Errorf("%s: %g, %v", text, q.Minus, err)
		}
	}
	q, err := ParseQuantity("5 mg/L as Ca^2+ +- 1 %", MassPerVolume)
	if err != nil || q.As != "Ca^2+" || q.Minus == 0 {
		t.Errorf("%+v %v", q, err)
	}
}

func TestWaivers(t *testing.T) {
	text := "recipe \"x\" {}\ntank \"T\" {}\nstage \"s\" {\n  hold { for = \"1 min\" }\n  waive \"SOL-01\" {\n    because = \"trial 14\"\n    until   = \"2026-01-31\"\n  }\n  waive \"SOL-02\" { phase = \"gypsum\" }\n}\n"
	r, problems := LoadBytes("x.recipe.hcl", []byte(text), Options{Root: ".", Today: time.Date(2026, 12, 1, 0, 0, 0, 0, time.UTC)})
	expired, reasonless := false, false
	for _, p := range problems {
		expired = expired || p.Code == "RCP-07" && !p.Fatal && p.At.Line == 5
		reasonless = reasonless || p.Code == "RCP-07" && p.Fatal && p.At.Line == 9
	}
	if !expired || !reasonless || !r.Stages[0].Waivers[0].Expired {
		t.Errorf("%+v", problems)
	}
}

func FuzzLoad(f *testing.F) {
	f.Add(whole)
	f.Add("recipe \"x\" { uses = [\"../a.stock.hcl\"] }")
	f.Add("stage \"s\" { dose \"a\" { mass = add(\"1 kg\", param[\"x\"]) } }")
	f.Fuzz(func(t *testing.T, text string) {
		r, problems := LoadBytes("x.recipe.hcl", []byte(text), Options{Root: t.TempDir()})
		for _, p := range problems {
			if p.Message == "" || p.Code == "" {
				t.Errorf("an empty problem: %+v", p)
			}
		}
		if r == nil && len(problems) == 0 {
			t.Error("nothing read and nothing told")
		}
	})
}

func BenchmarkLoad(b *testing.B) {
	text := []byte(whole)
	b.ReportAllocs()
	for b.Loop() {
		if _, problems := LoadBytes("x.recipe.hcl", text, Options{Root: "."}); len(problems) > 0 {
			b.Fatal(problems)
		}
	}
}
