// Calibrate writes tables/calibrated.csv: log K against temperature of the very
// soluble salts, each from the calibration rows of its handbook solubility curve
// with the activity model in use.
//
// The constant of a salt that is saturated at 5 mol/kg means nothing apart from
// the model that gives its activity, so it is made with that model: at each
// calibration point the saturated solution is solved with no solid allowed, and
// the ion activity product is the constant. Then
//
//	log10 K = c1 + c3/T + c4 log10 T     four points and more
//	log10 K = c1 + c3/T                  two or three
//	log10 K = value                      one; range that temperature alone, with the
//	                                     enthalpy of the row where it gives one
//
// by least squares. The rows marked check are never read here; the tests compare
// with them. Run it from the equilibrium folder through go generate.
package main

import (
	"encoding/csv"
	"fmt"
	"log"
	"math"
	"os"
	"sort"
	"strconv"
	"strings"

	"gonum.org/v1/gonum/mat"

	"dregs/equilibrium"
)

func main() {
	log.SetFlags(0)
	if len(os.Args) != 4 {
		log.Fatal("usage: calibrate UNCALIBRATED.csv SOLUBILITY.csv OUT.csv")
	}
	salts, err := readTable(os.Args[1])
	if err != nil {
		log.Fatal(err)
	}
	curves, err := readTable(os.Args[2])
	if err != nil {
		log.Fatal(err)
	}
	var out strings.Builder
	w := csv.NewWriter(&out)
	w.Write(strings.Split("name,formula,synonyms,reaction,log10_k_25c,enthalpy_kj_per_mol,c1,c2,c3,c4,c5,t_min_c,t_max_c,uncertainty_log10,forms,forms_above_c,density_g_cm3,source,basis,note", ","))
	for _, salt := range salts {
		row, err := calibrate(salt, curves)
		if err != nil {
			log.Printf("%s: left out: %v", salt["name"], err)
			continue
		}
		w.Write(row)
	}
	w.Flush()
	temporary := os.Args[3] + ".new"
	if err := os.WriteFile(temporary, []byte(out.String()), 0o644); err != nil {
		log.Fatal(err)
	}
	if err := os.Rename(temporary, os.Args[3]); err != nil {
		log.Fatal(err)
	}
}

// point is log10 of the ion activity product of a saturated solution.
type point struct{ tempK, logK float64 }

func calibrate(salt map[string]string, curves []map[string]string) ([]string, error) {
	if salt["curve"] == "" {
		return nil, fmt.Errorf("no solubility curve")
	}
	substance, solid, ok := strings.Cut(salt["curve"], "|")
	if !ok {
		return nil, fmt.Errorf("curve %q is not substance|solid phase", salt["curve"])
	}
	phase, err := phaseOf(salt)
	if err != nil {
		return nil, err
	}
	// The salt's own row may already stand in the tables from the last run: With
	// replaces it by the one with log K = 0, whose index is the activity product.
	db, err := equilibrium.Default().With([]*equilibrium.Phase{phase}, nil)
	if err != nil {
		return nil, err
	}
	var names []string
	for _, p := range phase.Parts {
		names = append(names, p.Component)
	}
	system, err := db.NewSystem(names)
	if err != nil {
		return nil, err
	}
	var points []point
	sources := map[string]bool{}
	low, high := math.Inf(1), math.Inf(-1)
	for _, row := range curves {
		if row["substance"] != substance || row["solid_phase"] != solid {
			continue
		}
		tempC, err := strconv.ParseFloat(row["t_c"], 64)
		if err != nil {
			return nil, err
		}
		low, high = math.Min(low, tempC), math.Max(high, tempC)
		if row["use"] != "calibrate" {
			continue
		}
		logK, err := activityProduct(system, phase, row, tempC+equilibrium.ZeroCelsius)
		if err != nil {
			return nil, fmt.Errorf("%s °C: %w", row["t_c"], err)
		}
		points = append(points, point{tempC + equilibrium.ZeroCelsius, logK})
		sources[row["source"]] = true
	}
	if len(points) == 0 {
		return nil, fmt.Errorf("curve %q has no calibration row", salt["curve"])
	}
	c1, c3, c4, residual := fit(points)
	if len(points) == 1 {
		low, high = points[0].tempK-equilibrium.ZeroCelsius, points[0].tempK-equilibrium.ZeroCelsius
	}
	at25 := c1 + c3/298.15 + c4*math.Log10(298.15)
	number := func(v float64, digits int) string {
		return strconv.FormatFloat(v, 'f', digits, 64)
	}
	enthalpy := ""
	coefficients := [5]string{number(c1, 6), "", number(c3, 4), number(c4, 6), ""}
	if len(points) == 1 && salt["enthalpy_kj_per_mol"] != "" {
		// From one point along van 't Hoff to 25 °C.
		kJ, err := strconv.ParseFloat(salt["enthalpy_kj_per_mol"], 64)
		if err != nil {
			return nil, err
		}
		enthalpy, coefficients = salt["enthalpy_kj_per_mol"], [5]string{}
		at25 += kJ * 1000 / (equilibrium.GasConstant * math.Ln10) * (1/points[0].tempK - 1/298.15)
	}
	c := coefficients
	row := []string{salt["name"], salt["formula"], salt["synonyms"], salt["reaction"], number(at25, 4), enthalpy,
		c[0], c[1], c[2], c[3], c[4], number(low, 1), number(high, 1),
		number(math.Max(0.02, 2*residual), 3), salt["forms"], salt["forms_above_c"], salt["density_g_cm3"],
		"calibrated on " + joined(sources) + " with the activity model of package equilibrium",
		"MEMORY; computed by internal/calibrate from the calibration rows of testdata/solubility.csv",
		strings.TrimPrefix(fmt.Sprintf("%s; %d calibration points, rms misfit %.3f in log K", salt["note"], len(points), residual), "; ")}
	return row, nil
}

func joined(set map[string]bool) string {
	var list []string
	for s := range set {
		list = append(list, s)
	}
	sort.Strings(list)
	return strings.Join(list, "; ")
}

// phaseOf builds the phase with log K = 0.
func phaseOf(salt map[string]string) (*equilibrium.Phase, error) {
	reaction, err := equilibrium.ParseReaction(salt["reaction"])
	if err != nil {
		return nil, err
	}
	phase := &equilibrium.Phase{Name: salt["name"], Formula: salt["formula"], Forms: equilibrium.FormsFast, Own: true,
		LogK: equilibrium.LogK{EnthalpyKJ: 0, MinC: 0, MaxC: 100}}
	for _, t := range reaction.Right {
		phase.Parts = append(phase.Parts, equilibrium.Part{Component: t.Name, Coefficient: t.Coefficient})
	}
	for _, t := range reaction.Left {
		if t.Name != salt["formula"] {
			phase.Parts = append(phase.Parts, equilibrium.Part{Component: t.Name, Coefficient: -t.Coefficient})
		}
	}
	return phase, nil
}

// activityProduct solves the saturated solution of one row with no solid allowed.
func activityProduct(system *equilibrium.System, phase *equilibrium.Phase, row map[string]string, tempK float64) (float64, error) {
	dry, err := equilibrium.ParseFormula(row["formula"])
	if err != nil {
		return 0, err
	}
	whole, err := equilibrium.ParseFormula(phase.Formula)
	if err != nil {
		return 0, err
	}
	value, err := strconv.ParseFloat(row["value"], 64)
	if err != nil {
		return 0, err
	}
	var gPerKg float64
	switch row["unit"] {
	case "g_per_100g_water":
		gPerKg = value * 10
	case "mass_percent":
		gPerKg = value / (100 - value) * 1000
	default:
		return 0, fmt.Errorf("unit %q cannot be calibrated on", row["unit"])
	}
	// How many formula units of the dry substance one mole of the solid holds: by
	// an element other than hydrogen and oxygen.
	perSolid := math.NaN()
	for e, n := range dry.Counts {
		if e != "H" && e != "O" {
			perSolid = whole.Counts[e] / n
		}
	}
	if math.IsNaN(perSolid) {
		return 0, fmt.Errorf("%s and %s share no element", row["formula"], phase.Formula)
	}
	mol := gPerKg / dry.MolarMass() / perSolid // of the solid, per kg of water
	waterMol := 1000 / equilibrium.MustParseFormula("H2O").MolarMass()
	totals := make([]float64, len(system.Components))
	for _, p := range phase.Parts {
		totals[system.Index(p.Component)] += p.Coefficient * mol
	}
	// The water of the hydrate is not part of the kilogram: the table counts the
	// dry substance.
	hydrate := (whole.MolarMass() - perSolid*dry.MolarMass()) / equilibrium.MustParseFormula("H2O").MolarMass()
	totals[system.Index("H2O")] += waterMol - hydrate*mol
	state := system.NewState()
	none := make([]bool, len(system.Phases))
	if err := system.NewSolver().Solve(totals, &equilibrium.Conditions{TempK: tempK, Allowed: none}, state); err != nil {
		return 0, err
	}
	return state.Index[system.PhaseIndex(phase.Name)], nil
}

// fit returns the coefficients and the rms misfit.
func fit(points []point) (c1, c3, c4, residual float64) {
	columns := 3
	switch {
	case len(points) == 1:
		return points[0].logK, 0, 0, 0
	case len(points) < 4:
		columns = 2
	}
	a := mat.NewDense(len(points), columns, nil)
	b := mat.NewVecDense(len(points), nil)
	for i, p := range points {
		a.Set(i, 0, 1)
		a.Set(i, 1, 1/p.tempK)
		if columns == 3 {
			a.Set(i, 2, math.Log10(p.tempK))
		}
		b.SetVec(i, p.logK)
	}
	var qr mat.QR
	qr.Factorize(a)
	x := mat.NewVecDense(columns, nil)
	if err := qr.SolveVecTo(x, false, b); err != nil {
		log.Printf("fit: %v", err)
	}
	c1, c3 = x.AtVec(0), x.AtVec(1)
	if columns == 3 {
		c4 = x.AtVec(2)
	}
	for _, p := range points {
		d := c1 + c3/p.tempK + c4*math.Log10(p.tempK) - p.logK
		residual += d * d
	}
	return c1, c3, c4, math.Sqrt(residual / float64(len(points)))
}

func readTable(path string) ([]map[string]string, error) {
	f, err := os.Open(path)
	if err != nil {
		return nil, err
	}
	defer f.Close()
	rows, err := csv.NewReader(f).ReadAll()
	if err != nil {
		return nil, fmt.Errorf("%s: %w", path, err)
	}
	var out []map[string]string
	for _, row := range rows[1:] {
		m := map[string]string{}
		for i, name := range rows[0] {
			m[name] = strings.TrimSpace(row[i])
		}
		out = append(out, m)
	}
	return out, nil
}
