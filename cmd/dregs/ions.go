package main

import (
	"regexp"
	"strings"
)

var (
	raised  = strings.NewReplacer("0", "⁰", "1", "¹", "2", "²", "3", "³", "4", "⁴", "5", "⁵", "6", "⁶", "7", "⁷", "8", "⁸", "9", "⁹", "+", "⁺", "-", "⁻")
	lowered = strings.NewReplacer("0", "₀", "1", "₁", "2", "₂", "3", "₃", "4", "₄", "5", "₅", "6", "₆", "7", "₇", "8", "₈", "9", "₉")

	plainIon = strings.NewReplacer("⁰", "0", "¹", "1", "²", "2", "³", "3", "⁴", "4", "⁵", "5", "⁶", "6", "⁷", "7", "⁸", "8", "⁹", "9", "⁺", "+", "⁻", "-",
		"₀", "0", "₁", "1", "₂", "2", "₃", "3", "₄", "4", "₅", "5", "₆", "6", "₇", "7", "₈", "8", "₉", "9")

	counts = regexp.MustCompile(`([A-Za-z)\]])([0-9]+)`)
	charge = regexp.MustCompile(`\^([0-9]*[+-])`)
)

// ionText writes a formula or an ion as on screens: SO4^2- as SO₄²⁻,
// CaSO4.2H2O as CaSO₄·2H₂O. Decimals (CaSO4.0.5H2O) stay on the line.
func ionText(formula string) string {
	text := charge.ReplaceAllStringFunc(formula, func(s string) string { return raised.Replace(s[1:]) })
	text = counts.ReplaceAllStringFunc(text, func(s string) string { return s[:1] + lowered.Replace(s[1:]) })
	first, water, hydrate := strings.Cut(text, ".")
	if hydrate && strings.HasSuffix(water, "H₂O") {
		return first + "·" + water
	}
	return text
}

var chargedWord = regexp.MustCompile(`[A-Z][A-Za-z0-9()]*[⁰¹²³⁴⁵⁶⁷⁸⁹]*[⁺⁻]`)

// ionsInText lowers the counts of the ions within a sentence (SO4²⁻); other words
// with digits may be names.
func ionsInText(text string) string {
	return chargedWord.ReplaceAllStringFunc(text, func(ion string) string {
		return counts.ReplaceAllStringFunc(ion, func(s string) string { return s[:1] + lowered.Replace(s[1:]) })
	})
}
