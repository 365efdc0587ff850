package equilibrium

import (
	"encoding/csv"
	"math"
	"os"
	"sort"
	"strconv"
	"testing"
)

// Mean activity coefficients at 25 °C up to the limit of the model. Check values:
// Robinson and Stokes, Electrolyte Solutions, and Hamer and Wu, as named row by row
// in testdata/activity.csv; nothing is calibrated on them. With ion pairs the
// stoichiometric coefficient is (Π a_i)^(1/ν) over the stoichiometric molalities.
func TestMeanActivityCoefficients(t *testing.T) {
	salts := map[string]struct {
		parts map[string]float64
		worst float64 // what this model can do; a test that it gets no worse
	}{
		"NaCl": {map[string]float64{"Na^+": 1, "Cl^-": 1}, 0.04}, "KCl": {map[string]float64{"K^+": 1, "Cl^-": 1}, 0.06},
		"HCl": {map[string]float64{"H^+": 1, "Cl^-": 1}, 0.06}, "NaOH": {map[string]float64{"Na^+": 1, "H^+": -1, "H2O": 1}, 0.10},
		"CaCl2": {map[string]float64{"Ca^2+": 1, "Cl^-": 2}, 0.10}, "Na2SO4": {map[string]float64{"Na^+": 2, "SO4^2-": 1}, 0.10},
		"MgSO4": {map[string]float64{"Mg^2+": 1, "SO4^2-": 1}, 0.10}, "KNO3": {map[string]float64{"K^+": 1, "NO3^-": 1}, 0.10},
		"NH4Cl": {map[string]float64{"NH4^+": 1, "Cl^-": 1}, 0.06},
	}
	f, err := os.Open("../testdata/activity.csv")
	if err != nil {
		t.Fatal(err)
	}
	defer f.Close()
	rows, err := csv.NewReader(f).ReadAll()
	if err != nil {
		t.Fatal(err)
	}
	count := map[string]int{}
	var all []float64
	for _, row := range rows[1:] {
		salt, ok := salts[row[0]]
		molality, _ := strconv.ParseFloat(row[2], 64)
		want, _ := strconv.ParseFloat(row[4], 64)
		if !ok || row[1] != "gamma_pm" || row[3] != "25" || want == 0 {
			continue
		}
		var names []string
		ionic, nu := 0.0, 0.0
		for n := range salt.parts {
			names = append(names, n)
		}
		s := mustSystem(t, names...)
		totals := make([]float64, len(s.Components))
		totals[water] = kgWater
		for n, k := range salt.parts {
			totals[s.Index(n)] += k * molality
		}
		// ions as they are weighed in: caustic gives sodium and hydroxide
		ions := map[string]float64{}
		for n, k := range salt.parts {
			if n == "H^+" && k < 0 {
				n, k = "OH^-", -k
			}
			if n != "H2O" {
				ions[n] = k
			}
		}
		st := mustSolve(t, s, totals, Conditions{TempK: 298.15, Allowed: make([]bool, len(s.Phases))})
		ln := 0.0
		for n, k := range ions {
			for i, sp := range s.Species {
				if sp.Name == n {
					ln += k * (math.Log(st.Molality[i]) + st.LnGamma[i] - math.Log(k*molality))
					ionic += 0.5 * k * molality * sp.Charge * sp.Charge
				}
			}
			nu += k
		}
		if ionic > sitLimit {
			continue
		}
		off := math.Exp(ln/nu)/want - 1
		count[row[0]]++
		all = append(all, math.Abs(off))
		if math.Abs(off) > salt.worst {
			t.Errorf("%s %g mol/kg: %.4f, published %.4f, %+.1f %%", row[0], molality, math.Exp(ln/nu), want, 100*off)
		}
	}
	sort.Float64s(all)
	t.Logf("%d values %v: median %.1f %%, 95 %% within %.1f %%, worst %.1f %%", len(all), count, 100*all[len(all)/2], 100*all[len(all)*95/100], 100*all[len(all)-1])
	if len(all) < 80 {
		t.Errorf("only %d values", len(all))
	}
}
