package main

import (
	"math"
	"strconv"
	"strings"
)

// figures writes a number with so many significant figures and no exponent
// where a person would write none.
func figures(x float64, n int) string {
	switch {
	case math.IsNaN(x) || math.IsInf(x, 0):
		return "-"
	case x == 0:
		return "0"
	}
	size := math.Abs(x)
	if size < 1e-4 || size >= 1e7 {
		return plainExponent(strconv.FormatFloat(x, 'e', n-1, 64))
	}
	places := n - 1 - int(math.Floor(math.Log10(size)))
	if places < 0 {
		places = 0
	}
	return trimZeros(strconv.FormatFloat(x, 'f', places, 64))
}

// plainExponent turns 1.20e-07 into 1.2e-7.
func plainExponent(s string) string {
	mantissa, exponent, _ := strings.Cut(s, "e")
	sign := ""
	if exponent[0] == '-' {
		sign = "-"
	}
	return trimZeros(mantissa) + "e" + sign + strings.TrimLeft(exponent[1:], "0")
}

func trimZeros(s string) string {
	if !strings.Contains(s, ".") {
		return s
	}
	return strings.TrimSuffix(strings.TrimRight(s, "0"), ".")
}

// fixed writes a number with so many decimal places, "-" when there is none.
func fixed(x float64, places int) string {
	if math.IsNaN(x) || math.IsInf(x, 0) {
		return "-"
	}
	s := strconv.FormatFloat(x, 'f', places, 64)
	if strings.Trim(s, "-0.") == "" {
		return strings.TrimPrefix(s, "-")
	}
	return s
}

// massText picks the unit that a person would weigh in.
func massText(massG float64) string {
	switch size := math.Abs(massG); {
	case math.IsNaN(massG):
		return "-"
	case size >= 1000:
		return figures(massG/1000, 3) + " kg"
	case size >= 0.1 || size == 0:
		return figures(massG, 3) + " g"
	}
	return figures(massG*1000, 3) + " mg"
}

// strengthText writes grams in a litre.
func strengthText(gPerL float64) string {
	if math.IsNaN(gPerL) {
		return "-"
	}
	if math.Abs(gPerL) < 0.1 {
		return figures(1000*gPerL, 3) + " mg/L"
	}
	return figures(gPerL, 3) + " g/L"
}

// indexText writes a saturation index with its uncertainty.
func indexText(index, uncertainty float64) string {
	if math.IsNaN(index) || math.IsInf(index, 0) {
		return "-"
	}
	text := fixed(index, 2)
	if text[0] != '-' {
		text = "+" + text
	}
	if !math.IsNaN(uncertainty) {
		text += " ± " + fixed(uncertainty, 2)
	}
	return text
}

// ionicText writes an ionic strength; that of pure water is none.
func ionicText(ionicStrength float64) string {
	if ionicStrength < 1e-6 {
		return "0"
	}
	return figures(ionicStrength, 3)
}

// percentText writes a probability or share; certainty is never claimed.
func percentText(share float64) string {
	switch {
	case math.IsNaN(share):
		return "-"
	case share > 0.99:
		return "over 99 %"
	case share < 0.01:
		return "under 1 %"
	}
	return fixed(100*share, 0) + " %"
}

// rounded keeps six significant figures: more than any constant has, and few
// enough that the last bits of the arithmetic do not show in files.
func rounded(x float64) float64 {
	y, err := strconv.ParseFloat(strconv.FormatFloat(x, 'g', 6, 64), 64)
	if err != nil || y == 0 {
		return 0
	}
	return y
}

// number is x for JSON, null when it was not computed.
func number(x float64) *float64 {
	if math.IsNaN(x) || math.IsInf(x, 0) {
		return nil
	}
	y := rounded(x)
	return &y
}

// plainNumber is x for CSV, empty when it was not computed.
func plainNumber(x float64) string {
	if p := number(x); p != nil {
		return strconv.FormatFloat(*p, 'g', -1, 64)
	}
	return ""
}
