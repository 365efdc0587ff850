package recipe

import (
	"path/filepath"
	"strings"

	"github.com/hashicorp/hcl/v2"
	"github.com/hashicorp/hcl/v2/hclsyntax"
	"github.com/zclconf/go-cty/cty"
	"github.com/zclconf/go-cty/cty/function"
)

// readParameters defines param[...] for everything that follows.
func (r *reader) readParameters(body *hclsyntax.Body) {
	values := map[string]cty.Value{}
	for _, b := range blocksOf(body, "parameter") {
		name, at := r.label(b, true)
		r.onlyAttributes(b.Body, "a parameter", []string{"value"})
		r.onlyBlocks(b.Body, "a parameter", nil)
		r.context = &hcl.EvalContext{Functions: map[string]function.Function{}}
		p := &Parameter{Name: name, At: at}
		if a := b.Body.Attributes["value"]; a == nil {
			r.problem("RCP-04", place(b.DefRange()), "value = \"5.8\"", "", "parameter %q has no value", name)
		} else if v, ok := r.value(a.Expr); ok {
			switch v.Type() {
			case cty.String:
				p.Value = v.AsString()
			case cty.Number:
				f, _ := v.AsBigFloat().Float64()
				p.Value = written(Quantity{Value: f, Dimension: Number})
			default:
				r.problem("RCP-03", place(a.Expr.Range()), "a text in quotes", "", "the value of a parameter is a text in quotes")
			}
		}
		if set, ok := r.o.Set[name]; ok {
			p.Value, p.Overridden = set, true
		}
		if _, twice := values[name]; twice {
			r.problem("RCP-05", at, "", "", "parameter %q is defined twice", name)
		}
		values[name] = cty.StringVal(p.Value)
		r.recipe.Parameters = append(r.recipe.Parameters, p)
	}
	var names []string
	for _, p := range r.recipe.Parameters {
		names = append(names, p.Name)
	}
	for _, name := range sortedKeys(r.o.Set) {
		if _, ok := values[name]; !ok && name != "batch" {
			r.problem("RCP-02", Range{File: r.recipe.File, Line: 1, Column: 1, EndLine: 1, EndColumn: 1}, "", Nearest(name, append(names, "batch")), "--set names %q, which is no parameter of the recipe", name)
		}
	}
	param := cty.EmptyObjectVal
	if len(values) > 0 {
		param = cty.ObjectVal(values)
	}
	r.context = &hcl.EvalContext{Variables: map[string]cty.Value{"param": param}, Functions: functions}
}

func (r *reader) readHead(b *hclsyntax.Block) {
	r.recipe.Name, r.recipe.At = r.label(b, true)
	r.onlyAttributes(b.Body, "recipe", []string{"revision", "batch", "uses", "rules", "repeat", "about"})
	r.onlyBlocks(b.Body, "recipe", nil)
	if s, _, ok := r.text(b.Body, "revision"); ok {
		r.recipe.Revision = s
	}
	if s, ok := r.o.Set["batch"]; ok {
		q, err := parseQuantity(s, []Dimension{Volume, Mass})
		if err != nil {
			r.problem("RCP-03", r.recipe.At, "", "", "--set batch: %s", err)
		} else {
			q.At = r.recipe.At
			r.recipe.Batch = &q
		}
	} else {
		r.recipe.Batch = r.quantity(b.Body, "batch", Volume, Mass)
	}
	if q := r.recipe.Batch; q != nil && q.Value <= 0 {
		r.problem("RCP-03", q.At, "a batch such as \"1000 L\"", "", "the batch is nothing")
		r.recipe.Batch = nil
	}
	if n, ok := r.number(b.Body, "repeat"); ok {
		if n < 1 || n > 1000 || n != float64(int(n)) {
			r.problem("RCP-03", place(b.Body.Attributes["repeat"].Expr.Range()), "a whole number from 1 to 1000", "", "repeat is how often the recipe is run into its own heel")
		} else {
			r.recipe.Repeat = int(n)
		}
	}
	for _, f := range r.texts(b.Body, "rules") {
		path := filepath.Join(r.dir, filepath.FromSlash(f.text))
		if filepath.IsAbs(f.text) || !inside(r.o.Root, path) {
			r.problem("RCP-09", f.at, "", "", "%q lies outside the repository of the recipe", f.text)
			continue
		}
		r.recipe.Rules = append(r.recipe.Rules, path)
	}
	for _, f := range r.texts(b.Body, "uses") {
		r.readStock(r.dir, f.text, f.at)
	}
}

type placedText struct {
	text string
	at   Range
}

// texts of a list attribute.
func (r *reader) texts(body *hclsyntax.Body, name string) []placedText {
	a := body.Attributes[name]
	if a == nil {
		return nil
	}
	list, ok := a.Expr.(*hclsyntax.TupleConsExpr)
	if !ok {
		r.problem("RCP-03", place(a.Expr.Range()), name+" = [\"...\", \"...\"]", "", "%s is a list of texts in brackets", name)
		return nil
	}
	var out []placedText
	for _, e := range list.Exprs {
		v, ok := r.value(e)
		if !ok {
			continue
		}
		if v.Type() != cty.String {
			r.problem("RCP-03", place(e.Range()), "a text in quotes", "", "%s is a list of texts", name)
			continue
		}
		out = append(out, placedText{v.AsString(), valueRange(e)})
	}
	return out
}

// readStock reads a stock file named at a place of a file in dir.
func (r *reader) readStock(dir, name string, at Range) {
	path := filepath.Join(dir, filepath.FromSlash(name))
	if filepath.IsAbs(name) {
		path = name
	}
	if !strings.HasSuffix(name, ".stock.hcl") {
		r.problem("RCP-09", at, "a name that ends in .stock.hcl", "", "%q is not a stock file", name)
		return
	}
	if !inside(r.o.Root, path) {
		r.problem("RCP-09", at, "", "", "%q lies outside the repository of the recipe", name)
		return
	}
	abs, _ := filepath.Abs(path)
	if r.reading[abs] {
		r.problem("RCP-09", at, "", "", "%q uses itself in a circle", name)
		return
	}
	if r.read[abs] {
		return
	}
	if len(r.reading) > 32 {
		r.problem("RCP-08", at, "", "", "stock files use each other more than 32 deep")
		return
	}
	text, err := readFile(path)
	if err != nil {
		r.problem("RCP-01", at, "", "", "%s", err)
		return
	}
	r.read[abs], r.reading[abs] = true, true
	defer delete(r.reading, abs)
	r.recipe.Uses = append(r.recipe.Uses, path)
	body, ok := r.parse(path, text)
	if !ok {
		return
	}
	stock, own := r.stock, r.dir
	r.stock, r.dir = true, filepath.Dir(path)
	r.onlyAttributes(body, "a stock file", []string{"uses"})
	r.onlyBlocks(body, "a stock file", []string{"water", "material", "tank", "phase", "complex"})
	for _, f := range r.texts(body, "uses") {
		r.readStock(r.dir, f.text, f.at)
	}
	r.readThings(body)
	r.stock, r.dir = stock, own
}

func sortedKeys(m map[string]string) []string {
	var out []string
	for k := range m {
		out = append(out, k)
	}
	for i := 1; i < len(out); i++ {
		for j := i; j > 0 && out[j] < out[j-1]; j-- {
			out[j], out[j-1] = out[j-1], out[j]
		}
	}
	return out
}
