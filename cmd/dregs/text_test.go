package main

import (
	"math"
	"strings"
	"testing"

	"dregs/recipe"
)

func TestFiguresAsAPersonWritesThem(t *testing.T) {
	for _, c := range []struct {
		got, want string
	}{
		{figures(0, 3), "0"}, {figures(1234.5, 3), "1234"}, {figures(0.041234, 3), "0.0412"}, {figures(1.2e-7, 2), "1.2e-7"},
		{figures(-3.0, 3), "-3"}, {figures(math.NaN(), 3), "-"}, {figures(2.5e9, 2), "2.5e9"},
		{fixed(-0.001, 2), "0.00"}, {fixed(7.068, 2), "7.07"},
		{massText(1900), "1.9 kg"}, {massText(2.61), "2.61 g"}, {massText(0.054), "54 mg"},
		{strengthText(719.4), "719 g/L"}, {strengthText(0.0064), "6.4 mg/L"},
		{indexText(0.634, 0.08), "+0.63 ± 0.08"}, {indexText(-0.001, 0.02), "+0.00 ± 0.02"}, {indexText(math.Inf(-1), 0.1), "-"},
		{percentText(1), "over 99 %"}, {percentText(0.75), "75 %"}, {percentText(0), "under 1 %"},
	} {
		if c.got != c.want {
			t.Errorf("%q, want %q", c.got, c.want)
		}
	}
}

func TestIonsOnScreens(t *testing.T) {
	for formula, want := range map[string]string{
		"SO4^2-": "SO₄²⁻", "CaSO4.2H2O": "CaSO₄·2H₂O", "Na^+": "Na⁺", "Ca(NO3)2.4H2O": "Ca(NO₃)₂·4H₂O",
		"CaSO4.0.5H2O": "CaSO₄·0.5H₂O", "Cu(NH3)4^2+": "Cu(NH₃)₄²⁺", "NaCl": "NaCl",
	} {
		if got := ionText(formula); got != want {
			t.Errorf("%s: %q, want %q", formula, got, want)
		}
	}
	if got := ionsInText("SO4²⁻ in tank T-101 with NO3⁻"); got != "SO₄²⁻ in tank T-101 with NO₃⁻" {
		t.Errorf("%q", got)
	}
}

func TestWrapKeepsValuesWithTheirUnits(t *testing.T) {
	for _, row := range wrap("gypsum comes down: 32.2 kg (29.8 g/L), index +0.63 ± 0.08 at 25 °C", 22) {
		if length(row) > 22 {
			t.Errorf("%q is too wide", row)
		}
		for _, torn := range []string{"32.2", "±", "25"} {
			if strings.HasSuffix(row, torn) {
				t.Errorf("%q ends within a value", row)
			}
		}
	}
}

func TestSplitAmount(t *testing.T) {
	for _, c := range []struct {
		text  string
		value float64
		unit  recipe.Dimension
		name  string
	}{
		{"1 kg water", 1, recipe.Mass, "water"},
		{"3 g CaSO4.2H2O", 0.003, recipe.Mass, "CaSO4.2H2O"},
		{"250 mL hydrochloric acid 37 %", 0.25, recipe.Volume, "hydrochloric acid 37 %"},
		{"0.1 mol NaCl", 0.1, recipe.Amount, "NaCl"},
		{"3 g +- 0.1 g gypsum", 0.003, recipe.Mass, "gypsum"},
	} {
		q, name, err := splitAmount(c.text)
		if err != nil || math.Abs(q.Value-c.value) > 1e-12 || q.Dimension != c.unit || name != c.name {
			t.Errorf("%s: %g of dimension %d, %q, %v", c.text, q.Value, q.Dimension, name, err)
		}
	}
	for _, text := range []string{"", "water", "3 g", "3 parsec water", "-3 g NaCl", "NaN kg water", "1e400 kg water"} {
		if _, name, err := splitAmount(text); err == nil {
			t.Errorf("%q was taken as an amount of %q", text, name)
		}
	}
}

func FuzzBeakerPlan(f *testing.F) {
	f.Add("3 g CaSO4.2H2O", "25 degC", "closed")
	f.Add("250 mL hydrochloric acid 37 %", "0 degC", "CO2 = 40 Pa")
	f.Add("1 kg sulfuric acid 20 %", "373 K", "air")
	f.Fuzz(func(t *testing.T, amount, at, headspace string) {
		plan, err := beakerPlan([]string{amount}, at, headspace)
		if err == nil && (len(plan.Stages) != 1 || len(plan.Stages[0].Steps) < 2) {
			t.Errorf("a plan without steps from %q", amount)
		}
	})
}

// Whatever the width, no row is wider than the page unless one word is.
func FuzzWrap(f *testing.F) {
	f.Add("gypsum comes down: 32.2 kg", 20)
	f.Add("\x1b[31m", 3)
	f.Fuzz(func(t *testing.T, text string, width int) {
		for _, row := range wrap(text, width) {
			if length(row) > width && len(joined(strings.Fields(row))) > 1 {
				t.Errorf("%q is wider than %d", row, width)
			}
			if strings.ContainsRune(row, '\x1b') {
				t.Errorf("%q steers the terminal", row)
			}
		}
	})
}
