package recipe

// unit turns a number into the unit in which its dimension is held.
type unit struct {
	name      string
	dimension Dimension
	factor    float64
	offset    float64 // temperatures: value*factor + offset
	basis     string  // hardness: the substance it counts as
}

// units that may be written. Factors: NIST SP 811 (2008), appendix B; UCUM codes
// stand beside the words. The US gallon is meant by gal.
var units = []unit{
	{"kg", Mass, 1, 0, ""}, {"g", Mass, 1e-3, 0, ""}, {"mg", Mass, 1e-6, 0, ""}, {"ug", Mass, 1e-9, 0, ""}, {"µg", Mass, 1e-9, 0, ""},
	{"t", Mass, 1000, 0, ""}, {"lb", Mass, 0.45359237, 0, ""}, {"[lb_av]", Mass, 0.45359237, 0, ""},
	{"L", Volume, 1, 0, ""}, {"l", Volume, 1, 0, ""}, {"mL", Volume, 1e-3, 0, ""}, {"ml", Volume, 1e-3, 0, ""}, {"m3", Volume, 1000, 0, ""}, {"m³", Volume, 1000, 0, ""}, {"uL", Volume, 1e-6, 0, ""},
	{"hL", Volume, 100, 0, ""}, {"gal", Volume, 3.785411784, 0, ""}, {"[gal_us]", Volume, 3.785411784, 0, ""}, {"imperial gal", Volume, 4.54609, 0, ""}, {"[gal_br]", Volume, 4.54609, 0, ""},
	{"mol", Amount, 1, 0, ""}, {"mmol", Amount, 1e-3, 0, ""}, {"kmol", Amount, 1000, 0, ""},
	{"wt%", MassFraction, 0.01, 0, ""}, {"%", MassFraction, 0.01, 0, ""}, {"g/kg", MassFraction, 1e-3, 0, ""}, {"mg/kg", MassFraction, 1e-6, 0, ""}, {"ppm", MassFraction, 1e-6, 0, ""}, {"[ppm]", MassFraction, 1e-6, 0, ""}, {"ppb", MassFraction, 1e-9, 0, ""},
	{"g/L", MassPerVolume, 1e-3, 0, ""}, {"g/l", MassPerVolume, 1e-3, 0, ""}, {"kg/m3", MassPerVolume, 1e-3, 0, ""}, {"mg/L", MassPerVolume, 1e-6, 0, ""}, {"mg/l", MassPerVolume, 1e-6, 0, ""}, {"ug/L", MassPerVolume, 1e-9, 0, ""}, {"µg/L", MassPerVolume, 1e-9, 0, ""}, {"g/m3", MassPerVolume, 1e-6, 0, ""},
	{"kg/L", Density, 1, 0, ""}, {"g/mL", Density, 1, 0, ""}, {"g/cm3", Density, 1, 0, ""}, {"kg/l", Density, 1, 0, ""},
	{"µmol/L", MolPerVolume, 1e-6, 0, ""}, {"°dH", MassPerVolume, 10e-6, 0, "CaO"}, {"°fH", MassPerVolume, 10e-6, 0, "CaCO3"}, {"°eH", MassPerVolume, 14.254e-6, 0, "CaCO3"},
	{"dH", MassPerVolume, 10e-6, 0, "CaO"}, {"fH", MassPerVolume, 10e-6, 0, "CaCO3"}, {"eH", MassPerVolume, 14.254e-6, 0, "CaCO3"},
	{"mol/L", MolPerVolume, 1, 0, ""}, {"mol/l", MolPerVolume, 1, 0, ""}, {"mmol/L", MolPerVolume, 1e-3, 0, ""}, {"mmol/l", MolPerVolume, 1e-3, 0, ""}, {"umol/L", MolPerVolume, 1e-6, 0, ""}, {"mol/m3", MolPerVolume, 1e-3, 0, ""},
	{"mol/kg", Molality, 1, 0, ""}, {"mmol/kg", Molality, 1e-3, 0, ""},
	{"eq/L", EqPerVolume, 1, 0, ""}, {"meq/L", EqPerVolume, 1e-3, 0, ""}, {"mmol(eq)/L", EqPerVolume, 1e-3, 0, ""},
	{"degC", Temperature, 1, 273.15, ""}, {"°C", Temperature, 1, 273.15, ""}, {"Cel", Temperature, 1, 273.15, ""}, {"K", Temperature, 1, 0, ""},
	{"degF", Temperature, 5.0 / 9, 273.15 - 32*5.0/9, ""}, {"°F", Temperature, 5.0 / 9, 273.15 - 32*5.0/9, ""}, {"[degF]", Temperature, 5.0 / 9, 273.15 - 32*5.0/9, ""},
	{"s", Duration, 1, 0, ""}, {"min", Duration, 60, 0, ""}, {"h", Duration, 3600, 0, ""}, {"d", Duration, 86400, 0, ""},
	{"Pa", Pressure, 1, 0, ""}, {"kPa", Pressure, 1000, 0, ""}, {"bar", Pressure, 1e5, 0, ""}, {"mbar", Pressure, 100, 0, ""}, {"MPa", Pressure, 1e6, 0, ""},
	{"m", Length, 1, 0, ""}, {"mm", Length, 1e-3, 0, ""}, {"um", Length, 1e-6, 0, ""}, {"µm", Length, 1e-6, 0, ""}, {"cm", Length, 1e-2, 0, ""},
}

var unitByName = func() map[string]*unit {
	m := make(map[string]*unit, len(units))
	for i := range units {
		m[units[i].name] = &units[i]
	}
	return m
}()

// example of a dimension, for messages.
var example = map[Dimension]string{
	Number: "a number such as \"7.2\"", Mass: "a mass such as \"12.5 kg\"", Volume: "a volume such as \"800 L\"", Amount: "an amount such as \"3 mol\"",
	MassFraction: "a fraction such as \"50 wt%\"", MassPerVolume: "a concentration such as \"82 mg/L\"", MolPerVolume: "a concentration such as \"0.1 mol/L\"",
	Molality: "a molality such as \"0.1 mol/kg\"", EqPerVolume: "equivalents such as \"2 meq/L\"", Temperature: "a temperature such as \"40 degC\"",
	Duration: "a time such as \"20 min\"", Pressure: "a pressure such as \"40 Pa\"", Length: "a length such as \"1 mm\"", Density: "a density such as \"1.525 kg/L\"",
}
