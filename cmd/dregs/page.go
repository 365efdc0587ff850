package main

import (
	"strings"
	"unicode"
	"unicode/utf8"

	"github.com/fatih/color"

	"dregs/recipe"
)

// page lays out text of a given width. Colour is put on after the layout, so
// that it never counts as width.
type page struct {
	strings.Builder
	width                             int
	strong, faint, stop, warn, remark *color.Color
}

func (c *call) page() *page {
	p := &page{width: c.width,
		strong: color.New(color.Bold), faint: color.New(color.Faint),
		stop: color.New(color.Bold, color.FgRed), warn: color.New(color.Bold, color.FgYellow), remark: color.New(color.Bold, color.FgBlue)}
	on := c.colour == "always" || c.colour != "never" && c.colourable
	for _, ink := range []*color.Color{p.strong, p.faint, p.stop, p.warn, p.remark} {
		if on {
			ink.EnableColor()
		} else {
			ink.DisableColor()
		}
	}
	return p
}

// ink is the colour of a level.
func (p *page) ink(level recipe.Level) *color.Color {
	switch level {
	case recipe.Stop:
		return p.stop
	case recipe.Caution:
		return p.warn
	}
	return p.remark
}

// glue stands for a space at which no line breaks.
const glue = "\x00"

func (p *page) line(parts ...string) {
	p.WriteString(strings.TrimRight(strings.ReplaceAll(strings.Join(parts, ""), glue, " "), " "))
	p.WriteByte('\n')
}

func (p *page) rule(stroke string) { p.line(p.faint.Sprint(strings.Repeat(stroke, p.width))) }

// ends puts left and right on one line, or on two when they do not fit.
func (p *page) ends(left, right string, ink *color.Color) {
	left, right = printable(left), printable(right)
	gap := p.width - length(left) - length(right)
	if right == "" || gap < 2 {
		p.line(ink.Sprint(left))
		if right != "" {
			p.line(pad(right, -p.width))
		}
		return
	}
	p.line(ink.Sprint(left), strings.Repeat(" ", gap), right)
}

// hang writes text behind a label, its further lines under the first.
func (p *page) hang(indent int, label string, labelWidth int, text string, ink *color.Color) {
	lead := strings.Repeat(" ", indent)
	label = printable(label)
	shown := pad(label, labelWidth)
	if label != "" && ink != nil {
		shown = ink.Sprint(label) + shown[len(label):]
	}
	for i, row := range wrap(text, p.width-indent-max(labelWidth, length(label))) {
		if i > 0 {
			shown = strings.Repeat(" ", max(labelWidth, length(label)))
		}
		p.line(lead, shown, row)
	}
}

// caution ends the page.
func (p *page) caution() {
	if !strings.HasSuffix(p.String(), "\n\n") {
		p.line()
	}
	for _, row := range wrap(caution, p.width) {
		p.line(p.faint.Sprint(row))
	}
}

// printable keeps a name in a file from steering the terminal.
func printable(s string) string {
	return strings.Map(func(r rune) rune {
		if unicode.IsControl(r) && r != '\x00' { // glue
			return '?'
		}
		return r
	}, s)
}

func length(s string) int { return utf8.RuneCountInString(s) }

// pad fills up to a width, on the left when it is negative.
func pad(s string, width int) string {
	if width < 0 {
		return strings.Repeat(" ", max(0, -width-length(s))) + s
	}
	return s + strings.Repeat(" ", max(0, width-length(s)))
}

// wrap breaks text at spaces; a number stays with its unit. A word that is wider
// than the page stands alone.
func wrap(text string, width int) []string {
	var rows []string
	row := ""
	for _, word := range joined(strings.Fields(text)) {
		word = printable(word)
		switch {
		case row == "":
			row = word
		case length(row)+1+length(word) <= width:
			row += " " + word
		default:
			rows = append(rows, row)
			row = word
		}
	}
	return append(rows, row)
}

// joined glues what a line break would tear: "2.1 g/L", "+0.63 ± 0.08".
func joined(words []string) []string {
	var out []string
	for _, word := range words {
		last := len(out) - 1
		if last >= 0 && (word == "±" || strings.HasSuffix(out[last], " ±") || isNumber(out[last]) && isUnit(word)) {
			out[last] += " " + word
			continue
		}
		out = append(out, word)
	}
	return out
}

func isNumber(word string) bool {
	tail := word
	if at := strings.LastIndex(word, " "); at >= 0 {
		tail = word[at+1:]
	}
	digits := strings.Trim(tail, "+-−.,0123456789")
	return digits == "" && strings.ContainsAny(tail, "0123456789") && !strings.HasSuffix(tail, ".") && !strings.HasSuffix(tail, ",")
}

func isUnit(word string) bool {
	switch strings.TrimRight(word, ".,;:)") {
	case "%", "kg", "g", "mg", "t", "L", "mL", "m³", "g/L", "mg/L", "mol", "mmol", "mol/kg", "mol/L", "kJ", "K", "°C", "min", "h", "d", "s", "kPa", "Pa", "bar", "kg/L", "wt%":
		return true
	}
	return false
}

func wrapPlain(text string, width int) string { return strings.Join(wrap(text, width), "\n") }
