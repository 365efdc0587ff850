package trace

import (
	"math"
	"testing"

	"dregs/recipe"
)

// Water analyses with what must come out of them. The waters are invented; the
// figures are worked by hand from atomic weights.
func TestWaterAnalyses(t *testing.T) {
	mg := func(what string, v float64, as string) recipe.Content {
		return content1(what, v*1e-6, recipe.MassPerVolume, as)
	}
	tests := []struct {
		name     string
		ph       *recipe.Quantity
		contents []recipe.Content
		mmolL    map[string]float64 // totals of components
		balanced string
		missing  bool
	}{
		{"calcium as written", q(7.5, recipe.Number), []recipe.Content{mg("Ca", 40.078, ""), mg("alkalinity", 100.0869, "CaCO3")},
			map[string]float64{"Ca^2+": 1}, "", false},
		{"calcium as CaCO3", q(7.5, recipe.Number), []recipe.Content{mg("Ca", 100.0869, "CaCO3"), mg("alkalinity", 122.04, "HCO3")},
			map[string]float64{"Ca^2+": 1}, "", false},
		{"nitrate as N", q(7, recipe.Number), []recipe.Content{mg("NO3", 14.007, "N"), mg("Na", 22.99, "")},
			map[string]float64{"NO3^-": 1, "Na^+": 1}, "", false},
		{"phosphate as P2O5", q(8, recipe.Number), []recipe.Content{mg("PO4", 70.9725, "P2O5"), mg("Na", 45.98, "")},
			map[string]float64{"PO4^3-": 1}, "HCO3^-", true},
		{"hardness fills in magnesium", q(8, recipe.Number), []recipe.Content{mg("Ca", 40.078, ""), mg("hardness", 150.13, "CaCO3"), mg("alkalinity", 150.13, "CaCO3")},
			map[string]float64{"Ca^2+": 1, "Mg^2+": 0.5}, "", false},
		{"too many cations", q(7, recipe.Number), []recipe.Content{mg("Ca", 40.078, ""), mg("alkalinity", 50.0435, "CaCO3")},
			map[string]float64{"Ca^2+": 1, "Cl^-": 1}, "Cl^-", false},
		{"too many anions", q(7, recipe.Number), []recipe.Content{mg("Ca", 40.078, ""), mg("Cl", 35.45, ""), mg("alkalinity", 100.0869, "CaCO3")},
			map[string]float64{"Ca^2+": 1, "Na^+": 1}, "Na^+", false},
		{"no pH", nil, []recipe.Content{mg("Ca", 40.078, ""), mg("alkalinity", 100.0869, "CaCO3")},
			map[string]float64{"Ca^2+": 1, "CO3^2-": 2, "H^+": 2}, "", true},
		{"silica", q(7.2, recipe.Number), []recipe.Content{mg("SiO2", 60.083, ""), mg("Na", 22.99, ""), mg("Cl", 35.45, "")},
			map[string]float64{"H4SiO4(aq)": 1}, "", false},
		{"alkalinity not given", q(7.8, recipe.Number), []recipe.Content{mg("Ca", 40.078, ""), mg("Cl", 35.45, "")},
			map[string]float64{"Ca^2+": 1, "Cl^-": 1}, "HCO3^-", true},
		{"acid water", q(3, recipe.Number), []recipe.Content{mg("SO4", 96.06, ""), mg("Na", 22.99, "")},
			map[string]float64{"SO4^2-": 1}, "Na^+", false},
	}
	for _, test := range tests {
		t.Run(test.name, func(t *testing.T) {
			r := plan([]*recipe.Tank{tank("T-1", "closed")}, charge("site", litres(1)))
			r.Waters = []*recipe.Water{{Name: "site", PH: test.ph, Temperature: celsius(20), Contents: test.contents}}
			tr := walked(t, r)
			c, end := tr.Materials["site"], tr.end()
			net := 0.0
			for i, k := range tr.System.Components {
				net += k.Charge * end.Totals[i]
			}
			if math.Abs(net) > 1e-12 {
				t.Errorf("charged %g mol", net)
			}
			for name, want := range test.mmolL {
				if got := 1000 * end.Totals[tr.System.Index(name)]; math.Abs(got-want) > 2e-3*want {
					t.Errorf("%s %.5f mmol/L, want %.5f", name, got, want)
				}
			}
			if test.ph != nil && math.Abs(end.Clear.PH-test.ph.Value) > 1e-4 {
				t.Errorf("pH %.5f, stated %.2f", end.Clear.PH, test.ph.Value)
			}
			if c.BalancedWith != test.balanced {
				t.Errorf("balanced with %q, want %q; imbalance %.4f", c.BalancedWith, test.balanced, c.ImbalanceFraction)
			}
			if (len(tr.Missing) > 0) != test.missing {
				t.Errorf("missing %v", tr.Missing)
			}
			if math.Abs(c.DensityKgL-0.9985) > 0.001 {
				t.Errorf("density %.5f kg/L", c.DensityKgL)
			}
		})
	}
}

// The alkalinity of the water must be what was stated, whatever the pH: what
// proton balance there is against carbon dioxide and water.
func TestStatedAlkalinityHoldsAtTheStatedPH(t *testing.T) {
	for _, ph := range []float64{6.2, 7, 7.6, 8.3, 9} {
		r := plan([]*recipe.Tank{tank("T-1", "closed")}, charge("site", litres(1)))
		r.Waters = []*recipe.Water{{Name: "site", PH: q(ph, recipe.Number), Temperature: celsius(25), Contents: []recipe.Content{
			content1("Na", 68.97e-6, recipe.MassPerVolume, ""), content1("alkalinity", 3e-3, recipe.EqPerVolume, "")}}}
		tr := walked(t, r)
		st := tr.end().Clear
		m := func(name string) float64 {
			for i, s := range tr.System.Species {
				if s.Name == name {
					return st.Molality[i] * st.WaterKg
				}
			}
			return 0
		}
		got := m("HCO3^-") + 2*m("CO3^2-") + m("OH^-") - m("H^+") + m("NaHCO3(aq)") + 2*m("NaCO3^-") + m("NaOH(aq)")
		if math.Abs(got-3e-3) > 2e-6 || math.Abs(st.PH-ph) > 1e-4 {
			t.Errorf("pH %.4f for %.2f, alkalinity %.6f mol", st.PH, ph, got)
		}
	}
}
