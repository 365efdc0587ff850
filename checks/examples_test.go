package checks

import (
	"os"
	"path/filepath"
	"strings"
	"testing"

	"dregs/recipe"
	"dregs/recipe/trace"
)

// Every example says in its head what dregs says of it: "# dregs: clear", or
// "# dregs: CODE solid" with "# faults here" beside the line. There is no other
// stop, and in a clear one no caution either.
func TestExamplesSayWhatIsFound(t *testing.T) {
	files, err := filepath.Glob("../examples/*.recipe.hcl")
	if err != nil || len(files) < 10 {
		t.Fatalf("%d examples, %v", len(files), err)
	}
	clear, faulty := 0, 0
	for _, file := range files {
		t.Run(filepath.Base(file), func(t *testing.T) {
			text, err := os.ReadFile(file)
			if err != nil {
				t.Fatal(err)
			}
			said, at := "", 0
			for i, line := range strings.Split(string(text), "\n") {
				if _, after, ok := strings.Cut(line, "# dregs: "); ok {
					said = "" + after
				} else if _, after, ok := strings.Cut(line, "dregs: "); ok && strings.HasPrefix(line, "#") {
					said = after
				}
				if strings.Contains(line, "# faults here") {
					at = i + 1
				}
			}
			code, solid, _ := strings.Cut(strings.TrimSpace(said), " ")
			r, problems := recipe.Load(file, readOptions())
			for _, p := range problems {
				t.Errorf("line %d: %s", p.At.Line, p.Message)
			}
			tr := trace.Walk(r, trace.Options{})
			for _, p := range tr.Problems {
				t.Errorf("line %d: %s", p.At.Line, p.Message)
			}
			found := false
			for _, f := range Run(tr, nil, nil) {
				switch {
				case code != "clear" && f.Code == code && f.At.Line == at && (solid == "" || f.Phase == solid):
					found = true
				case f.Level == recipe.Stop, code == "clear" && f.Level == recipe.Caution:
					t.Errorf("line %d: %s %s: %s", f.At.Line, f.Level, f.Code, f.Message)
				}
			}
			switch {
			case code == "clear":
				clear++
			case found:
				faulty++
			default:
				t.Errorf("%s %s is not found at line %d", code, solid, at)
			}
		})
	}
	if clear < 5 || faulty < 5 {
		t.Errorf("%d clear examples and %d faulty ones", clear, faulty)
	}
}
