package equilibrium

import (
	"fmt"
	"strconv"
	"strings"
)

// Term is one substance of a reaction with its coefficient.
type Term struct {
	Coefficient float64
	Name        string
}

// Reaction is left = right, as written in a table.
type Reaction struct {
	Left, Right []Term
}

// ParseReaction reads "Ca^2+ + H^+ + CO3^2- = CaHCO3^+". Terms are parted by
// " + " with spaces, so that the plus of a charge is no separator.
func ParseReaction(text string) (Reaction, error) {
	left, right, ok := strings.Cut(text, " = ")
	if !ok {
		return Reaction{}, fmt.Errorf("reaction %q has no \" = \"", text)
	}
	l, err := parseTerms(left)
	if err != nil {
		return Reaction{}, fmt.Errorf("reaction %q: %w", text, err)
	}
	r, err := parseTerms(right)
	if err != nil {
		return Reaction{}, fmt.Errorf("reaction %q: %w", text, err)
	}
	return Reaction{l, r}, nil
}

func parseTerms(side string) ([]Term, error) {
	var terms []Term
	for _, piece := range strings.Split(side, " + ") {
		piece = strings.TrimSpace(piece)
		if piece == "" {
			return nil, fmt.Errorf("a term is empty")
		}
		t := Term{1, piece}
		if number, name, ok := strings.Cut(piece, " "); ok {
			n, err := strconv.ParseFloat(number, 64)
			if err != nil || !(n > 0) || n > 1000 {
				return nil, fmt.Errorf("%q is not a coefficient", number)
			}
			t = Term{n, strings.TrimSpace(name)}
		}
		terms = append(terms, t)
	}
	return terms, nil
}
