package equilibrium

import "math"

// LogK is log10 of an equilibrium constant against temperature.
//
// With coefficients: log10 K = c1 + c2·T + c3/T + c4·log10 T + c5/T², T in
// kelvin, between MinC and MaxC; outside, the curve goes on with the slope it
// has at the limit (van 't Hoff), and the row says it is outside its range.
// Without coefficients: van 't Hoff from the value at 25 °C and the enthalpy.
// Without an enthalpy either: the value at 25 °C everywhere.
type LogK struct {
	At25C       float64
	EnthalpyKJ  float64 // kJ/mol, NaN when not known
	C           [5]float64
	HasC        bool
	MinC, MaxC  float64 // °C, where the source vouches for it
	Uncertainty float64 // log10 units at 25 °C, about one standard deviation unless the source says otherwise
}

const (
	// GasConstant in J/(mol K), exact in the SI of 2019.
	GasConstant = 8.31446261815324
	// ZeroCelsius in K.
	ZeroCelsius = 273.15
	tempRefK    = 298.15
	ln10        = math.Ln10
)

// At returns log10 K at tempK.
func (k *LogK) At(tempK float64) float64 {
	if k.HasC {
		limit := tempK
		if low := k.MinC + ZeroCelsius; tempK < low {
			limit = low
		} else if high := k.MaxC + ZeroCelsius; tempK > high {
			limit = high
		}
		value := k.polynomial(limit)
		if limit != tempK {
			// d log K / d(1/T) at the limit
			slope := (k.polynomial(limit+0.05) - k.polynomial(limit-0.05)) / (1/(limit+0.05) - 1/(limit-0.05))
			value += slope * (1/tempK - 1/limit)
		}
		return value
	}
	if math.IsNaN(k.EnthalpyKJ) || k.EnthalpyKJ == 0 {
		return k.At25C
	}
	return k.At25C - k.EnthalpyKJ*1000/(GasConstant*ln10)*(1/tempK-1/tempRefK)
}

func (k *LogK) polynomial(tempK float64) float64 {
	return k.C[0] + k.C[1]*tempK + k.C[2]/tempK + k.C[3]*math.Log10(tempK) + k.C[4]/(tempK*tempK)
}

// InRange tells whether the source vouches for the constant at tempK.
func (k *LogK) InRange(tempK float64) bool {
	c := tempK - ZeroCelsius
	return c >= k.MinC-0.5 && c <= k.MaxC+0.5
}

// UncertaintyAt is the uncertainty of log10 K at tempK: the source's within its
// range, growing by a guessed 5 kJ/mol of enthalpy error outside it (15 kJ/mol
// when no enthalpy is known at all). Common practice, no source.
func (k *LogK) UncertaintyAt(tempK float64) float64 {
	if k.InRange(tempK) {
		return k.Uncertainty
	}
	nearest := math.Min(math.Max(tempK, k.MinC+ZeroCelsius), k.MaxC+ZeroCelsius)
	errorKJ := 5.0
	if !k.HasC && math.IsNaN(k.EnthalpyKJ) {
		errorKJ = 15
	}
	grown := errorKJ * 1000 / (GasConstant * ln10) * math.Abs(1/tempK-1/nearest)
	return math.Hypot(k.Uncertainty, grown)
}
