package recipe

import (
	"fmt"
	"math"
	"strconv"
	"strings"
)

// wrongPart is an error at a part of a quantity's text.
type wrongPart struct {
	from, to int // bytes within the text
	message  string
	nearest  string
}

func (w *wrongPart) Error() string {
	if w.nearest != "" {
		return w.message + "; the nearest is " + w.nearest
	}
	return w.message
}

// ParseQuantity reads one amount outside a file, of one of the given dimensions.
func ParseQuantity(text string, want ...Dimension) (Quantity, error) {
	return parseQuantity(text, want)
}

// parseQuantity reads
//
//	NUMBER UNIT [as FORMULA] [+- NUMBER (UNIT|%)]
//	NUMBER UNIT .. NUMBER UNIT [as FORMULA]
//
// into the unit of the dimension. The error is a *wrongPart.
func parseQuantity(text string, want []Dimension) (Quantity, error) {
	q := Quantity{Text: text}
	fail := func(from, to int, format string, args ...any) (Quantity, error) {
		return q, &wrongPart{from: from, to: to, message: fmt.Sprintf(format, args...)}
	}
	if len(text) > 120 {
		return fail(0, len(text), "an amount of %d characters is too long", len(text))
	}
	body := text
	if i := strings.Index(body, " as "); i >= 0 {
		rest := body[i+4:]
		formula := rest
		for _, sign := range []string{"+-", "+/-", "±"} {
			if j := strings.Index(rest, " "+sign); j >= 0 {
				formula = rest[:j]
			} else if j := strings.Index(rest, sign); j >= 0 && sign == "±" {
				formula = rest[:j]
			}
		}
		q.As = strings.TrimSpace(formula)
		body = body[:i] + strings.Repeat(" ", 4+len(formula)) + rest[len(formula):]
		if q.As == "" {
			return fail(i, len(text), "\"as\" needs a formula, such as \"as CaCO3\"")
		}
	}
	if i := strings.Index(body, ".."); i >= 0 {
		low, err := scalar(body[:i], 0, want, nil)
		if err != nil {
			// the unit may stand behind the second number only
			if alone, ok := number(strings.TrimSpace(body[:i])); ok {
				high, err2 := scalar(body[i+2:], i+2, want, nil)
				if err2 != nil {
					return q, err2
				}
				low = high
				low.Value = alone*high.unit.factor + high.unit.offset
				err = nil
			}
			if err != nil {
				return q, err
			}
		}
		high, err := scalar(body[i+2:], i+2, want, nil)
		if err != nil {
			return q, err
		}
		if high.unit.dimension != low.unit.dimension || high.Value < low.Value {
			return fail(0, len(text), "a range goes from the lower to the higher value of one kind")
		}
		q.Value, q.Dimension = (low.Value+high.Value)/2, high.unit.dimension
		q.Minus = (high.Value - low.Value) / 2
		q.Plus = q.Minus
		return q, q.basis(high.unit)
	}
	main, tolerance, at := body, "", -1
	for _, sign := range []string{"+-", "±", "+/-"} {
		if i := strings.Index(body, sign); i >= 0 {
			main, tolerance, at = body[:i], body[i+len(sign):], i+len(sign)
			break
		}
	}
	value, err := scalar(main, 0, want, nil)
	if err != nil {
		return q, err
	}
	q.Value, q.Dimension = value.Value, value.unit.dimension
	if at >= 0 {
		t := strings.TrimSpace(tolerance)
		if percent, ok := strings.CutSuffix(t, "%"); ok && !strings.HasSuffix(t, "wt%") {
			v, ok := number(strings.TrimSpace(percent))
			if !ok || v < 0 {
				return fail(at, len(text), "the tolerance %q is not a number of percent", t)
			}
			q.Minus = math.Abs(value.raw*value.unit.factor) * v / 100 // of the number as written
		} else {
			d, err := scalar(tolerance, at, []Dimension{q.Dimension}, value.unit)
			if err != nil {
				return q, err
			}
			q.Minus = math.Abs(d.raw * d.unit.factor)
		}
		q.Plus = q.Minus
		if q.Dimension != Temperature && q.Dimension != Number && q.Minus > math.Abs(q.Value) {
			return fail(at, len(text), "the tolerance is larger than the value")
		}
	}
	return q, q.basis(value.unit)
}

func (q *Quantity) basis(u *unit) error {
	if u.basis != "" {
		if q.As != "" {
			return &wrongPart{0, len(q.Text), fmt.Sprintf("%s already counts as %s", u.name, u.basis), ""}
		}
		q.As = u.basis
	}
	return nil
}

type scalarValue struct {
	Value, raw float64
	unit       *unit
}

var plainUnit = &unit{"", Number, 1, 0, ""}

// scalar reads NUMBER UNIT at an offset of the whole text. usual is taken when the
// unit is left out (in tolerances).
func scalar(s string, offset int, want []Dimension, usual *unit) (scalarValue, error) {
	lead := len(s) - len(strings.TrimLeft(s, " "))
	t := strings.TrimSpace(s)
	end := 0
	for end < len(t) && (t[end] >= '0' && t[end] <= '9' || strings.IndexByte("+-.eE_", t[end]) >= 0) {
		if (t[end] == 'e' || t[end] == 'E') && (end+1 >= len(t) || !(t[end+1] >= '0' && t[end+1] <= '9' || t[end+1] == '-' || t[end+1] == '+')) {
			break
		}
		end++
	}
	from, to := offset+lead, offset+lead+len(t)
	v, ok := number(t[:end])
	if !ok {
		return scalarValue{}, &wrongPart{from, to, fmt.Sprintf("%q does not begin with a number; expected %s", t, expected(want)), ""}
	}
	name := strings.TrimSpace(t[end:])
	name = strings.TrimPrefix(strings.TrimPrefix(name, "degrees "), "degree ")
	u := unitByName[name]
	unitFrom := from + end
	for unitFrom < to && s[unitFrom-offset] == ' ' {
		unitFrom++
	}
	switch {
	case name == "" && usual != nil:
		u = usual
	case name == "" && has(want, Number):
		u = plainUnit
	case name == "":
		return scalarValue{}, &wrongPart{from, to, fmt.Sprintf("%q has no unit; expected %s", t, expected(want)), ""}
	case u == nil:
		return scalarValue{}, &wrongPart{unitFrom, to, fmt.Sprintf("%q is not a unit; expected %s", name, expected(want)), Nearest(name, unitNames(want))}
	}
	dimension := u.dimension
	// kg/L and g/L measure the same thing: a density where one is wanted.
	alike := dimension == Density && has(want, MassPerVolume) && !has(want, Density) || dimension == MassPerVolume && has(want, Density) && !has(want, MassPerVolume)
	if len(want) > 0 && !has(want, dimension) && !alike {
		return scalarValue{}, &wrongPart{unitFrom, to, fmt.Sprintf("%s measures %s here; expected %s", name, kindName(dimension), expected(want)), ""}
	}
	if alike {
		c := *u
		if dimension == Density {
			c.dimension = MassPerVolume
		} else {
			c.dimension = Density
		}
		u = &c
	}
	value := v*u.factor + u.offset
	if math.IsInf(value, 0) || math.IsNaN(value) || math.Abs(v) > 1e15 {
		return scalarValue{}, &wrongPart{from, to, fmt.Sprintf("%q is not a usable number", t), ""}
	}
	if value < 0 && u.dimension != Number || u.dimension == MassFraction && value > 1+1e-9 {
		return scalarValue{}, &wrongPart{from, to, fmt.Sprintf("%q cannot be: %s", t, impossible(u.dimension)), ""}
	}
	return scalarValue{value, v, u}, nil
}

func impossible(d Dimension) string {
	switch d {
	case MassFraction:
		return "a fraction lies between 0 and 100 %"
	case Temperature:
		return "it is below absolute zero"
	}
	return "it is negative"
}

func number(s string) (float64, bool) {
	if len(s) > 40 || strings.ContainsAny(s, "_xXpPnNiI") {
		return 0, false
	}
	v, err := strconv.ParseFloat(s, 64)
	return v, err == nil && !math.IsNaN(v) && !math.IsInf(v, 0)
}

func has(list []Dimension, d Dimension) bool {
	for _, x := range list {
		if x == d {
			return true
		}
	}
	return false
}

func expected(want []Dimension) string {
	var parts []string
	for _, d := range want {
		parts = append(parts, example[d])
	}
	if len(parts) == 0 {
		return "an amount with its unit"
	}
	return strings.Join(parts, " or ")
}

func kindName(d Dimension) string {
	return [...]string{"nothing", "a number", "mass", "volume", "amount of substance", "mass fraction", "mass per volume", "amount per volume", "molality", "equivalents per volume", "temperature", "time", "pressure", "length", "density"}[d]
}

func unitNames(want []Dimension) []string {
	var out []string
	for _, u := range units {
		if len(want) == 0 || has(want, u.dimension) {
			out = append(out, u.name)
		}
	}
	return out
}
