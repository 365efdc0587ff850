package equilibrium

import (
	"encoding/csv"
	"math"
	"os"
	"sort"
	"strconv"
	"strings"
	"testing"
)

type curvePoint struct {
	substance, formula, solid, use string
	tempC, gPerKg                  float64
}

// solubilityCurves reads the handbook table; rows per litre are left out here.
func solubilityCurves(t testing.TB) []curvePoint {
	t.Helper()
	f, err := os.Open("../testdata/solubility.csv")
	if err != nil {
		t.Fatal(err)
	}
	defer f.Close()
	rows, err := csv.NewReader(f).ReadAll()
	if err != nil {
		t.Fatal(err)
	}
	var out []curvePoint
	for _, r := range rows[1:] {
		tempC, err1 := strconv.ParseFloat(r[3], 64)
		v, err2 := strconv.ParseFloat(r[4], 64)
		if err1 != nil || err2 != nil {
			t.Fatalf("row %v", r)
		}
		p := curvePoint{r[0], r[1], r[2], r[6], tempC, v * 10}
		switch r[5] {
		case "g_per_100g_water":
		case "mass_percent":
			p.gPerKg = v / (100 - v) * 1000
		default:
			continue
		}
		out = append(out, p)
	}
	return out
}

// dissolves returns g of the dry substance that 1 kg of water holds beside the
// phase alone.
func dissolves(t testing.TB, phase *Phase, dry Formula, tempC float64) float64 {
	t.Helper()
	var names []string
	for _, p := range phase.Parts {
		names = append(names, p.Component)
	}
	s := mustSystem(t, names...)
	i := s.PhaseIndex(phase.Name)
	allowed := make([]bool, len(s.Phases))
	allowed[i] = true
	whole := MustParseFormula(phase.Formula)
	perSolid := 0.0
	for e, n := range dry.Counts {
		if e != "H" && e != "O" {
			perSolid = whole.Counts[e] / n
		}
	}
	hydrate := (whole.MolarMass() - perSolid*dry.MolarMass()) / 18.015
	sv, st := s.NewSolver(), s.NewState()
	c := &Conditions{TempK: tempC + ZeroCelsius, Allowed: allowed}
	for mol := 1.0; mol < 200; mol *= 1.7 {
		totals := make([]float64, len(s.Components))
		totals[water] = kgWater
		for _, p := range phase.Parts {
			totals[s.Index(p.Component)] += p.Coefficient * mol
		}
		if err := sv.Solve(totals, c, st); err != nil {
			return math.NaN()
		}
		if st.SolidMol[i] > 0 {
			dissolved := mol - st.SolidMol[i]
			// water that is not bound in what is left over: the kilogram plus what the
			// dissolved hydrate gave
			waterKg := 1 + 0.018015*hydrate*dissolved
			return dissolved * perSolid * dry.MolarMass() / waterKg
		}
	}
	return math.Inf(1)
}

// Check rows only: the calibration of tables/calibrated.csv never saw them.
// Source of the figures: the handbook named in each row of the file.
func TestVerySolubleSaltsBetweenCalibrationPoints(t *testing.T) {
	byCurve := map[string]*Phase{}
	err := readTable(tables, "uncalibrated.csv", func(r record) error {
		if p, ok := Default().LookupPhase(r.text("name")); ok && r.text("curve") != "" {
			byCurve[r.text("curve")] = p
		}
		return nil
	})
	if err != nil {
		t.Fatal(err)
	}
	type row struct {
		name            string
		tempC, got, rel float64
	}
	var rows []row
	for _, p := range solubilityCurves(t) {
		phase := byCurve[p.substance+"|"+p.solid]
		if phase == nil || p.use != "check" || !phase.LogK.InRange(p.tempC+ZeroCelsius) {
			continue
		}
		got := dissolves(t, phase, MustParseFormula(p.formula), p.tempC)
		rows = append(rows, row{phase.Name, p.tempC, got, got/p.gPerKg - 1})
	}
	sort.Slice(rows, func(i, j int) bool { return math.Abs(rows[i].rel) > math.Abs(rows[j].rel) || math.IsNaN(rows[i].rel) })
	var worst []string
	for _, r := range rows[:min(len(rows), 25)] {
		worst = append(worst, r.name+" "+strconv.FormatFloat(r.tempC, 'f', 0, 64)+" °C "+strconv.FormatFloat(100*r.rel, 'f', 1, 64)+" %")
	}
	median := math.Abs(rows[len(rows)/2].rel)
	tail := math.Abs(rows[len(rows)/20].rel)
	t.Logf("%d check points, median deviation %.2f %%, 95 %% within %.1f %%; farthest: %s", len(rows), 100*median, 100*tail, strings.Join(worst, ", "))
	if len(rows) < 100 {
		t.Errorf("only %d check points", len(rows))
	}
	if median > 0.02 || tail > 0.12 {
		t.Errorf("median %.3f, 95 %% within %.3f", median, tail)
	}
}
