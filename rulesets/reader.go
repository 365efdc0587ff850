package rulesets

import (
	"fmt"
	"sort"
	"strings"

	"github.com/hashicorp/hcl/v2/hclsyntax"
	"github.com/zclconf/go-cty/cty"

	"dregs/recipe"
)

const mostProblems = 50 // of one file

type reader struct {
	set      *Set
	first    bool // the standard set itself: every limit is new
	codes    []string
	problems []recipe.Problem
}

func (r *reader) problem(code string, at recipe.Range, expected, nearest, format string, args ...any) {
	if len(r.problems) < mostProblems {
		r.problems = append(r.problems, recipe.Problem{Code: code, Level: recipe.Stop, Fatal: true, Message: fmt.Sprintf(format, args...), Expected: expected, Nearest: nearest, At: at})
	}
}

// unknown tells a name that nothing defines: with the nearest, or else all.
func (r *reader) unknown(at recipe.Range, what, name string, known []string) {
	near, expected := recipe.Nearest(name, known), ""
	if near == "" {
		expected = "one of " + strings.Join(known, ", ")
	}
	r.problem("RCP-02", at, expected, near, "there is no %s %q", what, name)
}

var blocks = []string{"ruleset", "limits", "levels"}

func (r *reader) read(body *hclsyntax.Body, path string) {
	for _, a := range sorted(body) {
		r.problem("RCP-04", recipe.Place(a.NameRange), "limits { } or levels { }", "", "%q stands outside a block", a.Name)
	}
	seen := map[string]bool{}
	for _, b := range body.Blocks {
		if !known(b.Type, blocks) {
			r.unknown(recipe.Place(b.TypeRange), "block", b.Type, blocks)
			continue
		}
		if seen[b.Type] {
			r.problem("RCP-05", recipe.Place(b.TypeRange), "", "", "a second %s block", b.Type)
			continue
		}
		seen[b.Type] = true
		for _, inner := range b.Body.Blocks {
			r.problem("RCP-04", recipe.Place(inner.TypeRange), "NAME = VALUE", "", "no block may stand in %s", b.Type)
		}
		switch labels := len(b.Labels); {
		case b.Type == "ruleset" && labels != 1:
			r.problem("RCP-04", recipe.Place(b.TypeRange), "ruleset \"name\" { }", "", "a ruleset has one name")
		case b.Type != "ruleset" && labels != 0:
			r.problem("RCP-04", recipe.Place(b.LabelRanges[0]), b.Type+" { }", "", "%s takes no name", b.Type)
		}
		for _, a := range sorted(b.Body) {
			switch b.Type {
			case "limits":
				r.limit(a)
			case "levels":
				r.level(a)
			default:
				r.head(a)
			}
		}
	}
	if !seen["ruleset"] {
		r.problem("RCP-04", recipe.Range{File: path, Line: 1, Column: 1, EndLine: 1, EndColumn: 1}, "ruleset \"name\" { }", "", "the file has no ruleset block")
	}
}

func (r *reader) head(a *hclsyntax.Attribute) {
	if a.Name != "revision" && a.Name != "because" {
		r.unknown(recipe.Place(a.NameRange), "attribute", a.Name, []string{"revision", "because"})
		return
	}
	if _, ok := plain(a.Expr); !ok {
		r.problem("RCP-03", recipe.Place(a.Expr.Range()), "a text in quotes", "", "%s cannot be read", a.Name)
	}
}

func (r *reader) limit(a *hclsyntax.Attribute) {
	standard, ok := r.set.Limits[a.Name]
	if !ok && !r.first {
		r.unknown(recipe.Place(a.NameRange), "limit", a.Name, r.set.names())
		return
	}
	at := recipe.Place(a.Expr.Range())
	text, ok := plain(a.Expr)
	if !ok {
		r.problem("RCP-03", at, "a value in quotes, such as "+fmt.Sprintf("%q", standard.Text), "", "limit %s cannot be read", a.Name)
		return
	}
	var want []recipe.Dimension
	if !r.first {
		want = []recipe.Dimension{standard.Dimension}
	} else {
		want = []recipe.Dimension{recipe.Number, recipe.MassPerVolume, recipe.MassFraction, recipe.Volume}
	}
	q, err := recipe.ParseQuantity(text, want...)
	switch {
	case err != nil:
		r.problem("RCP-03", at, "", "", "limit %s: %s", a.Name, err)
	case q.Value < 0:
		r.problem("RCP-03", at, "0 or more", "", "limit %s is negative", a.Name)
	case q.Minus > 0 || q.Plus > 0 || q.As != "":
		r.problem("RCP-03", at, "one value, such as "+fmt.Sprintf("%q", standard.Text), "", "limit %s takes no tolerance and no \"as\"", a.Name)
	default:
		q.At = at
		r.set.Limits[a.Name] = q
	}
}

var levels = map[string]recipe.Level{"note": recipe.Note, "caution": recipe.Caution, "stop": recipe.Stop}

func (r *reader) level(a *hclsyntax.Attribute) {
	if !known(a.Name, r.codes) {
		r.unknown(recipe.Place(a.NameRange), "code", a.Name, r.codes)
		return
	}
	text, ok := plain(a.Expr)
	level, isLevel := levels[text]
	if !ok || !isLevel {
		r.problem("RCP-03", recipe.Place(a.Expr.Range()), "\"stop\", \"caution\" or \"note\"", recipe.Nearest(text, []string{"stop", "caution", "note"}), "%q is no level", text)
		return
	}
	r.set.Levels[a.Name] = level
}

// plain is the text of a literal: a quoted text or a number as written. Anything
// that would have to be worked out is refused.
func plain(e hclsyntax.Expression) (string, bool) {
	switch e := e.(type) {
	case *hclsyntax.TemplateExpr:
		if len(e.Parts) == 0 {
			return "", true
		}
		if len(e.Parts) != 1 {
			return "", false
		}
		return plain(e.Parts[0])
	case *hclsyntax.UnaryOpExpr:
		text, ok := plain(e.Val)
		return "-" + text, ok && e.Op == hclsyntax.OpNegate
	case *hclsyntax.LiteralValueExpr:
		switch {
		case e.Val.IsNull():
			return "", false
		case e.Val.Type() == cty.String:
			return e.Val.AsString(), true
		case e.Val.Type() == cty.Number:
			v, _ := e.Val.AsBigFloat().Float64()
			return fmt.Sprintf("%.15g", v), true
		}
	}
	return "", false
}

func sorted(body *hclsyntax.Body) []*hclsyntax.Attribute {
	out := make([]*hclsyntax.Attribute, 0, len(body.Attributes))
	for _, a := range body.Attributes {
		out = append(out, a)
	}
	sort.Slice(out, func(i, j int) bool { return out[i].NameRange.Start.Byte < out[j].NameRange.Start.Byte })
	return out
}

func known(name string, list []string) bool {
	for _, k := range list {
		if k == name {
			return true
		}
	}
	return false
}
