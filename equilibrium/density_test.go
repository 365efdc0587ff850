package equilibrium

import (
	"math"
	"testing"
)

// Densities at 20 °C, Perry, Chemical Engineers' Handbook, tables of densities of
// aqueous solutions (check; caustic at 20 and 50 wt% is calibration). All figures
// from memory.
func TestDensityOfSolutions(t *testing.T) {
	tests := []struct {
		name       string
		components map[string]float64 // moles of component per mole of solute
		formula    string
		wt, want   float64 // mass fraction, kg/L
		tolerance  float64
	}{
		{"sodium chloride", map[string]float64{"Na^+": 1, "Cl^-": 1}, "NaCl", 0.10, 1.0707, 0.005},
		{"sodium chloride", map[string]float64{"Na^+": 1, "Cl^-": 1}, "NaCl", 0.24, 1.1804, 0.008},
		{"potassium chloride", map[string]float64{"K^+": 1, "Cl^-": 1}, "KCl", 0.20, 1.1328, 0.01},
		{"calcium chloride", map[string]float64{"Ca^2+": 1, "Cl^-": 2}, "CaCl2", 0.20, 1.1775, 0.015},
		{"magnesium sulfate", map[string]float64{"Mg^2+": 1, "SO4^2-": 1}, "MgSO4", 0.20, 1.2198, 0.02},
		{"sodium sulfate", map[string]float64{"Na^+": 2, "SO4^2-": 1}, "Na2SO4", 0.10, 1.0915, 0.01},
		{"zinc sulfate", map[string]float64{"Zn^2+": 1, "SO4^2-": 1}, "ZnSO4", 0.20, 1.2323, 0.03},
		{"sulfuric acid", map[string]float64{"H^+": 2, "SO4^2-": 1}, "H2SO4", 0.30, 1.2185, 0.02},
		{"hydrochloric acid", map[string]float64{"H^+": 1, "Cl^-": 1}, "HCl", 0.20, 1.0980, 0.03},
		{"nitric acid", map[string]float64{"H^+": 1, "NO3^-": 1}, "HNO3", 0.30, 1.1800, 0.03},
		{"caustic soda", map[string]float64{"Na^+": 1, "H^+": -1, "H2O": 1}, "NaOH", 0.10, 1.1089, 0.02},
		{"caustic soda", map[string]float64{"Na^+": 1, "H^+": -1, "H2O": 1}, "NaOH", 0.50, 1.5253, 0.02},
		{"caustic potash", map[string]float64{"K^+": 1, "H^+": -1, "H2O": 1}, "KOH", 0.50, 1.5143, 0.03},
		{"ammonia", map[string]float64{"NH4^+": 1, "H^+": -1}, "NH3", 0.20, 0.9229, 0.02},
		{"phosphoric acid", map[string]float64{"H^+": 3, "PO4^3-": 1}, "H3PO4", 0.40, 1.2540, 0.02},
	}
	for _, test := range tests {
		var names []string
		for n := range test.components {
			names = append(names, n)
		}
		s := mustSystem(t, names...)
		mol := test.wt * 1000 / MustParseFormula(test.formula).MolarMass() // per kg of solution
		totals := make([]float64, len(s.Components))
		for n, k := range test.components {
			totals[s.Index(n)] += k * mol
		}
		totals[water] += (1 - test.wt) * kgWater
		st := mustSolve(t, s, totals, Conditions{TempK: 293.15, Allowed: make([]bool, len(s.Phases))})
		mass, volume := s.SolutionMassKg(st), s.VolumeL(st)
		got := mass / volume
		t.Logf("%-20s %2.0f wt%%: %.4f kg/L, table %.4f, %+.1f %%", test.name, 100*test.wt, got, test.want, 100*(got/test.want-1))
		if math.Abs(mass-1) > 1e-6 {
			t.Errorf("%s: mass %.8f kg of 1", test.name, mass)
		}
		if math.Abs(got/test.want-1) > test.tolerance {
			t.Errorf("%s %g wt%%: %.4f kg/L, want %.4f within %g %%", test.name, 100*test.wt, got, test.want, 100*test.tolerance)
		}
	}
}
