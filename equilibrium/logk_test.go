package equilibrium

import (
	"math"
	"testing"
)

func TestLogKAgainstTemperature(t *testing.T) {
	none := math.NaN()
	tests := []struct {
		name        string
		k           LogK
		tempC, want float64
	}{
		{"value alone", LogK{At25C: -5, EnthalpyKJ: none, MinC: 25, MaxC: 25}, 60, -5},
		{"van 't Hoff", LogK{At25C: -5, EnthalpyKJ: 20, MinC: 0, MaxC: 60}, 60, -5 + 20000/(8.314462618*math.Ln10)*(1/298.15-1/333.15)},
		// Plummer and Busenberg 1982, calcite, equation of the abstract: -8.48 at 25 °C, -8.38 at 0 °C (check)
		{"polynomial", LogK{C: [5]float64{-171.9065, -0.077993, 2839.319, 71.595}, HasC: true, MinC: 0, MaxC: 90}, 25, -8.480},
		{"polynomial at 0", LogK{C: [5]float64{-171.9065, -0.077993, 2839.319, 71.595}, HasC: true, MinC: 0, MaxC: 90}, 0, -8.381},
	}
	for _, test := range tests {
		if got := test.k.At(test.tempC + ZeroCelsius); math.Abs(got-test.want) > 0.002 {
			t.Errorf("%s: %.4f, want %.4f", test.name, got, test.want)
		}
	}
}

// Outside its range a polynomial goes on with its slope, not with its powers.
func TestLogKGoesOnSmoothly(t *testing.T) {
	k := LogK{C: [5]float64{-171.9065, -0.077993, 2839.319, 71.595}, HasC: true, MinC: 20, MaxC: 40, Uncertainty: 0.02}
	inside, outside := k.At(313.15), k.At(313.16)
	if math.Abs(inside-outside) > 1e-3 {
		t.Errorf("a step of %g at the limit", outside-inside)
	}
	if k.InRange(333.15) || !k.InRange(303.15) {
		t.Error("range")
	}
	if !(k.UncertaintyAt(353.15) > k.UncertaintyAt(333.15) && k.UncertaintyAt(303.15) == 0.02) {
		t.Error("uncertainty does not grow outside the range")
	}
}

func TestWaterDensity(t *testing.T) {
	// Kell 1975 form; reference values of the IAPWS-95 formulation at 1 atm (check,
	// from memory of the table): 0.99984, 0.99705, 0.98804, 0.95835 kg/L.
	for tempC, want := range map[float64]float64{0: 0.99984, 25: 0.99705, 50: 0.98804, 100: 0.95835} {
		if got := WaterDensityKgL(tempC + ZeroCelsius); math.Abs(got-want) > 3e-5 {
			t.Errorf("%g °C: %.5f kg/L, want %.5f", tempC, got, want)
		}
	}
}
