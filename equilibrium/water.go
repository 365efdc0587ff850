package equilibrium

import "math"

// waterMolarMass in kg/mol; from the abridged standard atomic weights.
const waterMolarMass = 0.018015

// WaterDensityKgL is the density of pure water at 1 atm, kg/L.
//
// Kell 1975, J. Chem. Eng. Data 20, 97; 0 to 150 °C, ITS-68 (the difference to
// ITS-90 is below 1e-5 here).
func WaterDensityKgL(tempK float64) float64 {
	t := tempK - ZeroCelsius
	num := 999.83952 + t*(16.945176+t*(-7.9870401e-3+t*(-4.6170461e-5+t*(1.0556302e-7-2.8054253e-10*t))))
	return num / (1 + 0.01687985*t) / 1000
}

// debyeHuckelAphi is the Debye-Hückel slope for the osmotic coefficient,
// kg^0.5 mol^-0.5, natural logarithms.
//
// A polynomial through the values that the permittivity of Archer and Wang 1990,
// J. Phys. Chem. Ref. Data 19, 371, gives from 0 to 100 °C; greatest misfit
// 1.3e-5.
func debyeHuckelAphi(tempK float64) float64 {
	u := (tempK - ZeroCelsius - 50) / 50
	u = math.Max(-1.2, math.Min(u, 1.2))
	return 0.41026412 + u*(0.04162664+u*(0.00808793+u*(-0.00018119+u*(-0.00017986+u*0.00029241))))
}
