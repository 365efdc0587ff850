package recipe

import (
	"fmt"
	"math"
	"strconv"

	"github.com/hashicorp/hcl/v2"
	"github.com/hashicorp/hcl/v2/hclsyntax"
	"github.com/zclconf/go-cty/cty"
	"github.com/zclconf/go-cty/cty/function"
)

// value evaluates an expression after making sure that it is a plain one: a text,
// a number, a list, an object, param["name"], or a function of these.
func (r *reader) value(expr hclsyntax.Expression) (cty.Value, bool) {
	if !r.plain(expr, 0) {
		return cty.NilVal, false
	}
	v, diagnostics := expr.Value(r.context)
	if diagnostics.HasErrors() {
		at := place(expr.Range())
		if s := diagnostics[0].Subject; s != nil {
			at = place(*s)
		}
		message := "this value cannot be worked out"
		if e := diagnostics[0].Detail; e != "" && len(e) < 200 && diagnostics[0].Summary == "Error in function call" {
			message = "this value cannot be worked out: " + trimCall(e)
		}
		r.problem("RCP-03", at, "", "", "%s", message)
		return cty.NilVal, false
	}
	if v.IsNull() || !v.IsWhollyKnown() {
		r.problem("RCP-03", place(expr.Range()), "", "", "this value is empty")
		return cty.NilVal, false
	}
	return v, true
}

// trimCall keeps what a function said of its own.
func trimCall(detail string) string {
	for i := 0; i+2 < len(detail); i++ {
		if detail[i] == ':' && detail[i+1] == ' ' {
			return detail[i+2:]
		}
	}
	return detail
}

func (r *reader) plain(expr hclsyntax.Expression, depth int) bool {
	refuse := func(what string) bool {
		r.problem("RCP-04", place(expr.Range()), "", "", "%s may not stand in a recipe", what)
		return false
	}
	if depth > mostDepth {
		return refuse("so deep a nesting")
	}
	switch e := expr.(type) {
	case *hclsyntax.LiteralValueExpr:
		return true
	case *hclsyntax.TemplateExpr:
		for _, p := range e.Parts {
			if !r.plain(p, depth+1) {
				return false
			}
		}
		return true
	case *hclsyntax.TemplateWrapExpr:
		return r.plain(e.Wrapped, depth+1)
	case *hclsyntax.ParenthesesExpr:
		return r.plain(e.Expression, depth+1)
	case *hclsyntax.UnaryOpExpr:
		return r.plain(e.Val, depth+1)
	case *hclsyntax.TupleConsExpr:
		for _, x := range e.Exprs {
			if !r.plain(x, depth+1) {
				return false
			}
		}
		return true
	case *hclsyntax.ObjectConsExpr:
		for _, item := range e.Items {
			if !r.plain(item.ValueExpr, depth+1) {
				return false
			}
		}
		return true
	case *hclsyntax.ObjectConsKeyExpr:
		return true
	case *hclsyntax.FunctionCallExpr:
		if _, ok := functions[e.Name]; !ok {
			r.problem("RCP-02", place(e.NameRange), "", Nearest(e.Name, functionNames), "there is no function %q", e.Name)
			return false
		}
		for _, x := range e.Args {
			if !r.plain(x, depth+1) {
				return false
			}
		}
		return true
	case *hclsyntax.ScopeTraversalExpr:
		return r.parameterUse(e.Traversal, place(e.Range()))
	case *hclsyntax.IndexExpr, *hclsyntax.RelativeTraversalExpr:
		return refuse("an index other than param[\"name\"]")
	}
	return refuse("a computed expression of this kind")
}

// literalKey is a key of an object that is written out: a word or a plain text.
// Keys are never computed: an expression there would be run unseen.
func literalKey(expr hclsyntax.Expression) (string, bool) {
	if k, ok := expr.(*hclsyntax.ObjectConsKeyExpr); ok {
		if word := hcl.ExprAsKeyword(k.Wrapped); word != "" && !k.ForceNonLiteral {
			return word, true
		}
		expr = k.Wrapped
	}
	if t, ok := expr.(*hclsyntax.TemplateExpr); ok && len(t.Parts) == 1 {
		if part, ok := t.Parts[0].(*hclsyntax.LiteralValueExpr); ok && part.Val.Type() == cty.String {
			return part.Val.AsString(), true
		}
	}
	return "", false
}

func (r *reader) parameterUse(t hcl.Traversal, at Range) bool {
	if t.RootName() != "param" {
		r.problem("RCP-02", at, "param[\"name\"], or a text in quotes", Nearest(t.RootName(), []string{"param"}), "%q stands for nothing", t.RootName())
		return false
	}
	if len(t) == 2 {
		name := ""
		switch step := t[1].(type) {
		case hcl.TraverseIndex:
			if step.Key.Type() == cty.String {
				name = step.Key.AsString()
			}
		case hcl.TraverseAttr:
			name = step.Name
		}
		if name != "" {
			var names []string
			for _, p := range r.recipe.Parameters {
				if p.Name == name {
					r.usedParameters[name] = true
					return true
				}
				names = append(names, p.Name)
			}
			r.problem("RCP-02", at, "", Nearest(name, names), "there is no parameter %q", name)
			return false
		}
	}
	r.problem("RCP-04", at, "param[\"name\"]", "", "a parameter is named in brackets")
	return false
}

// baseUnit writes a quantity back in the unit in which it is held.
var baseUnit = map[Dimension]string{Number: "", Mass: "kg", Volume: "L", Amount: "mol", MassFraction: "g/kg", MassPerVolume: "g/L", MolPerVolume: "mol/L",
	Molality: "mol/kg", EqPerVolume: "eq/L", Temperature: "K", Duration: "s", Pressure: "Pa", Length: "m", Density: "kg/L"}

func written(q Quantity) string {
	scale := 1.0
	if q.Dimension == MassFraction || q.Dimension == MassPerVolume {
		scale = 1000
	}
	s := strconv.FormatFloat(q.Value*scale, 'g', 15, 64)
	if u := baseUnit[q.Dimension]; u != "" {
		s += " " + u
	}
	if q.As != "" {
		s += " as " + q.As
	}
	if q.Minus > 0 {
		s += " +- " + strconv.FormatFloat(q.Minus*scale, 'g', 15, 64)
		if u := baseUnit[q.Dimension]; u != "" {
			s += " " + u
		}
	}
	return s
}

var functionNames = []string{"add", "divide", "max", "min", "subtract", "sum", "times"}

// functions for arithmetic on amounts: texts with units in, a text with a unit
// out. Tolerances add as squares in sums and scale with factors.
var functions = map[string]function.Function{
	"add": fold(func(a, b float64) float64 { return a + b }), "sum": fold(func(a, b float64) float64 { return a + b }),
	"subtract": fold(func(a, b float64) float64 { return a - b }),
	"min":      fold(math.Min), "max": fold(math.Max),
	"times": scaled(func(v, k float64) float64 { return v * k }), "divide": scaled(func(v, k float64) float64 { return v / k }),
}

func fold(f func(a, b float64) float64) function.Function {
	return function.New(&function.Spec{
		VarParam: &function.Parameter{Name: "amounts", Type: cty.String},
		Type:     function.StaticReturnType(cty.String),
		Impl: func(args []cty.Value, _ cty.Type) (cty.Value, error) {
			if len(args) == 0 || len(args) > 100 {
				return cty.NilVal, fmt.Errorf("between 1 and 100 amounts are expected")
			}
			var total Quantity
			for i, a := range args {
				q, err := parseQuantity(a.AsString(), nil)
				if err != nil {
					return cty.NilVal, err
				}
				if i == 0 {
					total = q
					continue
				}
				if q.Dimension != total.Dimension || q.As != total.As {
					return cty.NilVal, fmt.Errorf("%q and %q do not measure the same thing", args[0].AsString(), a.AsString())
				}
				one := total.Value
				total.Value = f(one, q.Value)
				switch total.Value { // the lesser or greater of two keeps its own tolerance
				case one:
				case q.Value:
					total.Minus = q.Minus
				default:
					total.Minus = math.Hypot(total.Minus, q.Minus)
				}
			}
			return cty.StringVal(written(total)), nil
		},
	})
}

func scaled(f func(v, k float64) float64) function.Function {
	return function.New(&function.Spec{
		Params: []function.Parameter{{Name: "amount", Type: cty.String}, {Name: "factor", Type: cty.Number}},
		Type:   function.StaticReturnType(cty.String),
		Impl: func(args []cty.Value, _ cty.Type) (cty.Value, error) {
			q, err := parseQuantity(args[0].AsString(), nil)
			if err != nil {
				return cty.NilVal, err
			}
			k, _ := args[1].AsBigFloat().Float64()
			if math.IsInf(k, 0) || f(1, k) != f(1, k) || math.IsInf(f(1, k), 0) {
				return cty.NilVal, fmt.Errorf("the factor %g cannot be used", k)
			}
			q.Value, q.Minus = f(q.Value, k), math.Abs(f(q.Minus, k))
			return cty.StringVal(written(q)), nil
		},
	})
}
