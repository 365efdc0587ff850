package equilibrium

import (
	"encoding/csv"
	"os"
	"strings"
	"testing"
)

// tables/uncalibrated.csv holds the very soluble salts whose constant is made with
// the activity model in use: each has one name, balances, and has its curve in
// testdata/solubility.csv or says by an empty cell that there is none. Such a salt
// must have no published constant beside the calibrated one.
func TestUncalibratedSalts(t *testing.T) {
	f, err := os.Open("../testdata/solubility.csv")
	if err != nil {
		t.Fatal(err)
	}
	defer f.Close()
	rows, err := csv.NewReader(f).ReadAll()
	if err != nil {
		t.Fatal(err)
	}
	toCalibrate := map[string]int{}
	for _, r := range rows[1:] {
		if r[6] == "calibrate" {
			toCalibrate[r[0]+"|"+r[2]]++
		}
	}

	published := map[string]bool{}
	err = readTable(tables, "phases.csv", func(r record) error {
		published[foldName(r.text("name"))] = true
		for _, s := range strings.Split(r.text("synonyms"), ";") {
			published[foldName(s)] = true
		}
		return nil
	})
	if err != nil {
		t.Fatal(err)
	}
	db := Default()
	seen := map[string]bool{}
	var without []string
	err = readTable(tables, "uncalibrated.csv", func(r record) error {
		name := r.text("name")
		for _, s := range append([]string{name}, strings.Split(r.text("synonyms"), ";")...) {
			key := foldName(s)
			if s != "" && (published[key] || seen[key]) {
				t.Errorf("%s: %q is named twice", name, s)
			}
			seen[key] = true
		}
		formula, err := ParseFormula(r.text("formula"))
		if err != nil {
			return err
		}
		reaction, err := ParseReaction(r.text("reaction"))
		if err != nil {
			return err
		}
		parts, err := dissolution(reaction, r.text("formula"))
		if err != nil {
			return err
		}
		if err := db.Balance(parts, formula.Counts, 0); err != nil {
			t.Errorf("%s: %v", name, err)
		}
		switch curve := r.text("curve"); {
		case curve == "":
			without = append(without, name)
			if _, ok := db.LookupPhase(name); ok {
				t.Errorf("%s has a constant and no curve", name)
			}
		case toCalibrate[curve] == 0:
			t.Errorf("%s: no row to calibrate on for %q", name, curve)
		default:
			p, ok := db.LookupPhase(name)
			if !ok || p.Name != name {
				t.Errorf("%s is not in calibrated.csv: run go generate ./equilibrium", name)
			} else if !p.LogK.HasC && toCalibrate[curve] > 1 {
				t.Errorf("%s: %d points and no temperature function", name, toCalibrate[curve])
			}
		}
		return nil
	})
	if err != nil {
		t.Fatal(err)
	}
	t.Logf("no curve, so no phase: %s", strings.Join(without, ", "))
}
