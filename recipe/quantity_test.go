package recipe

import (
	"math"
	"strings"
	"testing"
)

// Factors: NIST SP 811 (2008), appendix B.8 and B.9 (check).
func TestParseQuantity(t *testing.T) {
	tests := []struct {
		text        string
		want        []Dimension
		value       float64
		minus, plus float64
		as          string
	}{
		{"12.5 kg", []Dimension{Mass}, 12.5, 0, 0, ""},
		{"12.5kg", []Dimension{Mass}, 12.5, 0, 0, ""},
		{"1 lb", []Dimension{Mass}, 0.45359237, 0, 0, ""},
		{"96 kg +- 0.5 kg", []Dimension{Mass}, 96, 0.5, 0.5, ""},
		{"96 kg ± 0.5", []Dimension{Mass}, 96, 0.5, 0.5, ""},
		{"200 g +- 2 %", []Dimension{Mass}, 0.2, 0.004, 0.004, ""},
		{"95 kg .. 105 kg", []Dimension{Mass}, 100, 5, 5, ""},
		{"95 .. 105 kg", []Dimension{Mass}, 100, 5, 5, ""},
		{"1 gal", []Dimension{Volume}, 3.785411784, 0, 0, ""},
		{"1.5 m3", []Dimension{Volume}, 1500, 0, 0, ""},
		{"250 mL", []Dimension{Volume}, 0.25, 0, 0, ""},
		{"40 degC", []Dimension{Temperature}, 313.15, 0, 0, ""},
		{"104 degF", []Dimension{Temperature}, 313.15, 0, 0, ""},
		{"40 Cel +- 2 Cel", []Dimension{Temperature}, 313.15, 2, 2, ""},
		{"50 wt% +- 0.5 wt%", []Dimension{MassFraction}, 0.5, 0.005, 0.005, ""},
		{"210 mg/L as CaCO3", []Dimension{MassPerVolume}, 210e-6, 0, 0, "CaCO3"},
		{"5 mg/L as N +- 10 %", []Dimension{MassPerVolume}, 5e-6, 5e-7, 5e-7, "N"},
		{"14 dH", []Dimension{MassPerVolume}, 140e-6, 0, 0, "CaO"},
		{"1 degree fH", []Dimension{MassPerVolume}, 10e-6, 0, 0, "CaCO3"},
		{"1.525 kg/L", []Dimension{Density}, 1.525, 0, 0, ""},
		{"1525 kg/m3", []Dimension{Density}, 1.525, 0, 0, ""},
		{"2 meq/L", []Dimension{EqPerVolume}, 0.002, 0, 0, ""},
		{"20 min", []Dimension{Duration}, 1200, 0, 0, ""},
		{"40 Pa", []Dimension{Pressure}, 40, 0, 0, ""},
		{"7.2", []Dimension{Number}, 7.2, 0, 0, ""},
		{"1e-3 mol/kg", []Dimension{Molality}, 0.001, 0, 0, ""},
	}
	for _, test := range tests {
		q, err := ParseQuantity(test.text, test.want...)
		if err != nil {
			t.Errorf("%q: %v", test.text, err)
			continue
		}
		near := func(a, b float64) bool { return math.Abs(a-b) <= 1e-12*math.Max(1, math.Abs(b)) }
		if !near(q.Value, test.value) || !near(q.Minus, test.minus) || !near(q.Plus, test.plus) || q.As != test.as || q.Dimension != test.want[0] {
			t.Errorf("%q: %+v", test.text, q)
		}
	}
}

func TestWrongQuantities(t *testing.T) {
	tests := []struct {
		text string
		want Dimension
		says string
	}{
		{"12.5", Mass, "has no unit"},
		{"12.5 kgs", Mass, "is not a unit"},
		{"12.5 min", Mass, "measures time"},
		{"-3 kg", Mass, "negative"},
		{"1e400 kg", Mass, "does not begin with a number"},
		{"NaN kg", Mass, "does not begin with a number"},
		{"inf kg", Mass, "does not begin with a number"},
		{"0x10 kg", Mass, "is not a unit"},
		{"120 wt%", MassFraction, "between 0 and 100"},
		{"-300 degC", Temperature, "absolute zero"},
		{"5 kg +- 6 kg", Mass, "larger than the value"},
		{"105 kg .. 95 kg", Mass, "from the lower to the higher"},
		{"5 kg +- lots", Mass, "does not begin with a number"},
		{"", Mass, "does not begin with a number"},
		{strings.Repeat("9", 200) + " kg", Mass, "too long"},
	}
	for _, test := range tests {
		_, err := ParseQuantity(test.text, test.want)
		if err == nil || !strings.Contains(err.Error(), test.says) {
			t.Errorf("%q: %v, want it to say %q", test.text, err, test.says)
		}
	}
	if _, err := ParseQuantity("5 kgs", Mass); err == nil || !strings.Contains(err.Error(), "nearest is kg") {
		t.Errorf("no nearest unit: %v", err)
	}
}

func TestNearest(t *testing.T) {
	names := []string{"calcium nitrate", "calcium chloride", "gypsum", "T-101", "T-102"}
	for word, want := range map[string]string{"calcium nitrat": "calcium nitrate", "gpysum": "gypsum", "T-110": "T-101", "sodium sulfate": "", "xyz": ""} {
		if got := Nearest(word, names); got != want {
			t.Errorf("%q: %q, want %q", word, got, want)
		}
	}
}

func FuzzQuantity(f *testing.F) {
	for _, s := range []string{"12.5 kg +- 2 %", "1 .. 2 mol/L", "210 mg/L as CaCO3", "±", "1e9 degF", ".. kg", "5 as", "14 dH as N"} {
		f.Add(s)
	}
	f.Fuzz(func(t *testing.T, text string) {
		q, err := ParseQuantity(text)
		if err == nil && (math.IsNaN(q.Value) || math.IsInf(q.Value, 0) || q.Minus < 0 || q.Plus < 0 || math.IsNaN(q.Minus)) {
			t.Errorf("%q: %+v", text, q)
		}
	})
}
