package equilibrium

import (
	"fmt"
	"math"
	"sort"
	"strconv"
	"strings"
	"unicode/utf8"
)

// Formula is a chemical formula taken apart: how many of each element, and the
// charge.
type Formula struct {
	Text   string             // as written
	Counts map[string]float64 // by element symbol; hydrates such as CaSO4.0.5H2O give fractions
	Charge float64
}

// formulaDepth bounds the nesting of brackets: no real formula has more than
// three, and the parser recurses.
const formulaDepth = 16

// ParseFormula reads formulas such as Ca(NO3)2.4H2O, CuSO4·5H2O, [Cu(NH3)4]SO4,
// CaSO4.0.5H2O and ions such as SO4^2-, Na^+. A trailing state, (aq), (s), (l),
// (g) or (cr), is dropped. The error names the offending place.
func ParseFormula(text string) (Formula, error) {
	if !utf8.ValidString(text) {
		return Formula{}, fmt.Errorf("formula %q is not valid UTF-8", text)
	}
	f := Formula{Text: text, Counts: map[string]float64{}}
	body := plainDigits(strings.TrimSpace(text))
	for _, state := range []string{"(aq)", "(s)", "(l)", "(g)", "(cr)"} {
		body = strings.TrimSuffix(body, state)
	}
	if body == "" {
		return Formula{}, fmt.Errorf("empty formula")
	}
	if len(body) > 200 {
		return Formula{}, fmt.Errorf("formula of %d characters is too long (200 at most)", len(body))
	}
	if at := strings.IndexByte(body, '^'); at >= 0 {
		charge, err := parseCharge(body[at+1:])
		if err != nil {
			return Formula{}, fmt.Errorf("formula %q: %w", text, err)
		}
		f.Charge = charge
		body = body[:at]
	}
	parts, err := splitHydrate(body)
	if err != nil {
		return Formula{}, fmt.Errorf("formula %q: %w", text, err)
	}
	for i, part := range parts {
		multiple := 1.0
		if i > 0 {
			multiple, part = leadingNumber(part)
			if part == "" {
				return Formula{}, fmt.Errorf("formula %q: nothing after the dot", text)
			}
		}
		p := formulaParser{text: part}
		counts, err := p.group(0)
		if err != nil {
			return Formula{}, fmt.Errorf("formula %q: %w", text, err)
		}
		for e, n := range counts {
			f.Counts[e] += n * multiple
		}
	}
	return f, nil
}

// MustParseFormula is ParseFormula for formulas written in the program itself;
// it panics on an error.
func MustParseFormula(text string) Formula {
	f, err := ParseFormula(text)
	if err != nil {
		panic("equilibrium: " + err.Error())
	}
	return f
}

// MolarMass returns g/mol from the abridged standard atomic weights, corrected
// for the electrons of a charge by nothing: that is below the weights' own
// uncertainty.
func (f Formula) MolarMass() float64 {
	sum := 0.0
	for _, symbol := range f.Elements() {
		e, _ := LookupElement(symbol)
		sum += f.Counts[symbol] * e.AtomicWeight
	}
	return sum
}

// Elements returns the symbols in alphabetical order.
func (f Formula) Elements() []string {
	out := make([]string, 0, len(f.Counts))
	for e := range f.Counts {
		out = append(out, e)
	}
	sort.Strings(out)
	return out
}

// plainDigits turns subscripts, superscripts and the middle dot of printed
// formulas into the plain form.
func plainDigits(s string) string {
	var b strings.Builder
	super := false
	for _, r := range s {
		switch {
		case r >= '₀' && r <= '₉':
			b.WriteByte(byte('0' + r - '₀'))
		case r == '·' || r == '•' || r == '∙' || r == '*':
			b.WriteByte('.')
		case strings.ContainsRune("⁰¹²³⁴⁵⁶⁷⁸⁹⁺⁻", r):
			if !super {
				b.WriteByte('^')
				super = true
			}
			b.WriteString(map[rune]string{'⁰': "0", '¹': "1", '²': "2", '³': "3", '⁴': "4", '⁵': "5", '⁶': "6", '⁷': "7", '⁸': "8", '⁹': "9", '⁺': "+", '⁻': "-"}[r])
		case r == '−':
			b.WriteByte('-')
		default:
			b.WriteRune(r)
		}
	}
	return b.String()
}

// parseCharge reads what follows the caret: 2-, 2+, +, -, +2.
func parseCharge(s string) (float64, error) {
	bad := fmt.Errorf("charge %q is not of the form ^2- or ^+", "^"+s)
	if s == "" {
		return 0, bad
	}
	sign := 1.0
	switch {
	case s[len(s)-1] == '+' || s[len(s)-1] == '-':
		if s[len(s)-1] == '-' {
			sign = -1
		}
		s = s[:len(s)-1]
	case s[0] == '+' || s[0] == '-':
		if s[0] == '-' {
			sign = -1
		}
		s = s[1:]
		if s == "" {
			return 0, bad
		}
	default:
		return 0, bad
	}
	if s == "" {
		return sign, nil
	}
	n, err := strconv.Atoi(s)
	if err != nil || n < 1 || n > 12 {
		return 0, bad
	}
	return sign * float64(n), nil
}

// splitHydrate cuts at the dots that join parts, leaving decimal points alone:
// CaSO4.0.5H2O is CaSO4 and 0.5H2O. A dot is a joint when what stands before it
// is not the number of the part it is in.
func splitHydrate(body string) ([]string, error) {
	var parts []string
	start := 0
	for i := 0; i < len(body); i++ {
		if body[i] != '.' {
			continue
		}
		if len(parts) > 0 && isDigits(body[start:i]) && i > start {
			continue // decimal point of a multiplier
		}
		if i == start {
			return nil, fmt.Errorf("misplaced dot")
		}
		parts = append(parts, body[start:i])
		start = i + 1
	}
	if start >= len(body) {
		return nil, fmt.Errorf("nothing after the dot")
	}
	return append(parts, body[start:]), nil
}

func isDigits(s string) bool {
	for i := 0; i < len(s); i++ {
		if s[i] < '0' || s[i] > '9' {
			return false
		}
	}
	return true
}

// leadingNumber splits "4H2O" into 4 and "H2O"; without a number it is 1.
func leadingNumber(s string) (float64, string) {
	i := 0
	for i < len(s) && (s[i] >= '0' && s[i] <= '9' || s[i] == '.') {
		i++
	}
	if i == 0 {
		return 1, s
	}
	n, err := strconv.ParseFloat(s[:i], 64)
	if err != nil || n <= 0 || n > 1000 || math.IsNaN(n) {
		return 1, ""
	}
	return n, s[i:]
}

type formulaParser struct {
	text string
	at   int
}

// group reads elements and bracketed groups until the end or a closing bracket.
func (p *formulaParser) group(depth int) (map[string]float64, error) {
	if depth > formulaDepth {
		return nil, fmt.Errorf("brackets nested more than %d deep", formulaDepth)
	}
	counts := map[string]float64{}
	for p.at < len(p.text) {
		c := p.text[p.at]
		switch {
		case c == '(' || c == '[' || c == '{':
			closing := map[byte]byte{'(': ')', '[': ']', '{': '}'}[c]
			p.at++
			inner, err := p.group(depth + 1)
			if err != nil {
				return nil, err
			}
			if p.at >= len(p.text) || p.text[p.at] != closing {
				return nil, fmt.Errorf("bracket %q is not closed", string(c))
			}
			p.at++
			if len(inner) == 0 {
				return nil, fmt.Errorf("nothing between the brackets")
			}
			n, err := p.count()
			if err != nil {
				return nil, err
			}
			for e, k := range inner {
				counts[e] += k * n
			}
		case c == ')' || c == ']' || c == '}':
			if depth == 0 {
				return nil, fmt.Errorf("bracket %q was not opened", string(c))
			}
			return counts, nil
		case c >= 'A' && c <= 'Z':
			symbol := p.text[p.at : p.at+1]
			if p.at+1 < len(p.text) && p.text[p.at+1] >= 'a' && p.text[p.at+1] <= 'z' {
				symbol = p.text[p.at : p.at+2]
			}
			if _, ok := LookupElement(symbol); !ok {
				return nil, fmt.Errorf("%q is not an element", symbol)
			}
			p.at += len(symbol)
			n, err := p.count()
			if err != nil {
				return nil, err
			}
			counts[symbol] += n
		default:
			r, _ := utf8.DecodeRuneInString(p.text[p.at:])
			return nil, fmt.Errorf("%q does not belong in a formula", string(r))
		}
	}
	return counts, nil
}

// count reads the number behind an element or bracket, 1 when there is none.
func (p *formulaParser) count() (float64, error) {
	start := p.at
	for p.at < len(p.text) && p.text[p.at] >= '0' && p.text[p.at] <= '9' {
		p.at++
	}
	if start == p.at {
		return 1, nil
	}
	n, err := strconv.Atoi(p.text[start:p.at])
	if err != nil || n < 1 || n > 9999 {
		return 0, fmt.Errorf("count %q is not between 1 and 9999", p.text[start:p.at])
	}
	return float64(n), nil
}
