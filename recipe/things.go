package recipe

import (
	"math"
	"path/filepath"
	"sort"
	"strings"

	"github.com/hashicorp/hcl/v2/hclsyntax"
	"github.com/zclconf/go-cty/cty"

	"dregs/equilibrium"
)

// readThings reads what is defined once and used by name.
func (r *reader) readThings(body *hclsyntax.Body) {
	for _, b := range body.Blocks {
		switch b.Type {
		case "water":
			r.readWater(b)
		case "material":
			r.readMaterial(b)
		case "tank":
			r.readTank(b)
		case "liquor":
			r.readLiquor(b)
		case "phase":
			r.readOwnPhase(b)
		case "complex":
			r.readOwnComplex(b)
		}
	}
}

var contentDimensions = []Dimension{MassPerVolume, MolPerVolume, EqPerVolume, MassFraction, Molality}

// contents reads { Ca = "82 mg/L", ... } in the order written.
func (r *reader) contents(body *hclsyntax.Body) []Content {
	a := body.Attributes["contents"]
	if a == nil {
		return nil
	}
	object, ok := a.Expr.(*hclsyntax.ObjectConsExpr)
	if !ok {
		r.problem("RCP-03", place(a.Expr.Range()), "contents = { Ca = \"82 mg/L\" }", "", "contents are names with amounts in braces")
		return nil
	}
	var out []Content
	seen := map[string]bool{}
	for _, item := range object.Items {
		key, known := literalKey(item.KeyExpr)
		at := place(item.KeyExpr.Range())
		if !known {
			r.problem("RCP-03", at, "a name, in quotes when it holds other signs than letters and digits", "", "this is no name of a content")
			continue
		}
		name := key
		if seen[name] {
			r.problem("RCP-05", at, "", "", "%q stands twice in the contents", name)
		}
		seen[name] = true
		if q := r.quantityOf(item.ValueExpr, name, contentDimensions); q != nil {
			out = append(out, Content{What: name, Amount: *q, At: at})
		}
	}
	whole := 0.0
	for _, c := range out {
		if c.Amount.Dimension == MassFraction {
			whole += c.Amount.Value
		}
	}
	if whole > 1+1e-6 {
		r.problem("RCP-03", place(a.Expr.Range()), "fractions that add up to 100 wt% at most; the rest is water", "", "the contents add up to %.4g wt%%", 100*whole)
	}
	return out
}

func (r *reader) readWater(b *hclsyntax.Block) {
	name, at := r.label(b, true)
	r.onlyAttributes(b.Body, "a water", []string{"temperature", "ph", "contents", "about"})
	r.onlyBlocks(b.Body, "a water", nil)
	w := &Water{Name: name, At: at, FromStock: r.stock, Temperature: r.temperature(b.Body, "temperature"), PH: r.ph(b.Body, "ph"), Contents: r.contents(b.Body)}
	for i, old := range r.recipe.Waters {
		if old.Name == name {
			if r.twice("water", name, at, old.FromStock) {
				r.recipe.Waters[i] = w
			}
			return
		}
	}
	r.recipe.Waters = append(r.recipe.Waters, w)
}

// twice tells whether a second definition replaces the first: the recipe's own
// comes before a stock file's.
func (r *reader) twice(kind, name string, at Range, oldFromStock bool) bool {
	if oldFromStock && !r.stock {
		return true
	}
	r.problem("RCP-05", at, "", "", "%s %q is defined twice", kind, name)
	return false
}

func (r *reader) readMaterial(b *hclsyntax.Block) {
	name, at := r.label(b, true)
	r.onlyAttributes(b.Body, "a material", []string{"formula", "contents", "assay", "density", "particle_size", "temperature", "form", "inert", "about"})
	r.onlyBlocks(b.Body, "a material", nil)
	m := &Material{Name: name, At: at, FromStock: r.stock, Inert: r.truth(b.Body, "inert"), Contents: r.contents(b.Body),
		Assay: r.quantity(b.Body, "assay", MassFraction), Density: r.quantity(b.Body, "density", Density),
		ParticleSize: r.quantity(b.Body, "particle_size", Length), Temperature: r.temperature(b.Body, "temperature")}
	if s, at, ok := r.text(b.Body, "formula"); ok {
		m.Formula, m.FormulaAt = s, valueRange(b.Body.Attributes["formula"].Expr)
		if _, err := equilibrium.ParseFormula(s); err != nil {
			r.problem("RCP-03", at, "a formula such as \"Ca(NO3)2.4H2O\"", "", "%s", err)
		}
	}
	forms := []string{"powder", "granules", "crystals", "flakes", "solution", "liquid", "gas"}
	if s, at, ok := r.text(b.Body, "form"); ok {
		if !contains(forms, s) {
			r.problem("RCP-02", at, "one of "+strings.Join(forms, ", "), Nearest(s, forms), "there is no form %q", s)
		}
		m.Form = s
	}
	if m.Density != nil && m.Density.Value <= 0 {
		r.problem("RCP-03", m.Density.At, "", "", "a density is above zero")
	}
	for i, old := range r.recipe.Materials {
		if old.Name == name {
			if r.twice("material", name, at, old.FromStock) {
				r.recipe.Materials[i] = m
			}
			return
		}
	}
	r.recipe.Materials = append(r.recipe.Materials, m)
}

func (r *reader) temperature(body *hclsyntax.Body, name string) *Quantity {
	return r.sensible(r.quantity(body, name, Temperature), name)
}

// sensible refuses temperatures that no tank of water has.
func (r *reader) sensible(q *Quantity, name string) *Quantity {
	if q != nil && (q.Value < 273.15-20 || q.Value > 273.15+150) {
		r.problem("RCP-03", q.At, "a temperature between -20 and 150 degC", "", "%s is %.4g degC", name, q.Value-273.15)
		return nil
	}
	return q
}

func (r *reader) ph(body *hclsyntax.Body, name string) *Quantity {
	q := r.quantity(body, name, Number)
	if q != nil && (q.Value < -2 || q.Value > 16) {
		r.problem("RCP-03", q.At, "a pH between -2 and 16", "", "%s is %g", name, q.Value)
		return nil
	}
	return q
}

func (r *reader) readTank(b *hclsyntax.Block) {
	name, at := r.label(b, true)
	r.onlyAttributes(b.Body, "a tank", []string{"capacity", "least_fill", "headspace", "rating", "coldest", "built_of", "about"})
	r.onlyBlocks(b.Body, "a tank", []string{"heel"})
	t := &Tank{Name: name, At: at, FromStock: r.stock, Capacity: r.quantity(b.Body, "capacity", Volume),
		LeastFill: r.quantity(b.Body, "least_fill", Volume), Coldest: r.temperature(b.Body, "coldest")}
	t.Material, _, _ = r.text(b.Body, "built_of")
	if t.Capacity != nil && t.LeastFill != nil && t.LeastFill.Value >= t.Capacity.Value {
		r.problem("RCP-03", t.LeastFill.At, "", "", "least_fill is not below the capacity")
	}
	r.readHeadspace(b.Body, t)
	if a := b.Body.Attributes["rating"]; a != nil {
		low, high := r.pair(a, "rating", []Dimension{Temperature})
		t.RatingLow, t.RatingHigh = r.sensible(low, "rating"), r.sensible(high, "rating")
		if low != nil && high != nil && low.Value >= high.Value {
			r.problem("RCP-03", place(a.Expr.Range()), "[\"5 degC\", \"90 degC\"]", "", "the rating goes from the lower to the higher temperature")
		}
	}
	heels := blocksOf(b.Body, "heel")
	if len(heels) > 1 {
		r.problem("RCP-05", place(heels[1].DefRange()), "", "", "a tank has one heel")
	}
	if len(heels) > 0 {
		t.Heel = r.readCharge(heels[0], Charge, "heel")
		t.Heel.Tank = t
	}
	for i, old := range r.recipe.Tanks {
		if old.Name == name {
			if r.twice("tank", name, at, old.FromStock) {
				r.recipe.Tanks[i] = t
			}
			return
		}
	}
	r.recipe.Tanks = append(r.recipe.Tanks, t)
}

func (r *reader) readHeadspace(body *hclsyntax.Body, t *Tank) {
	t.Headspace = Headspace{Kind: "air", At: t.At}
	a := body.Attributes["headspace"]
	if a == nil {
		return
	}
	t.Headspace.At = place(a.Expr.Range())
	if object, ok := a.Expr.(*hclsyntax.ObjectConsExpr); ok {
		t.Headspace.Kind, t.Headspace.PartialPa = "given", map[string]float64{}
		gases := []string{"CO2", "NH3", "H2S", "SO2", "HCN"}
		for _, item := range object.Items {
			key, known := literalKey(item.KeyExpr)
			if !known {
				continue
			}
			name := key
			if !contains(gases, name) {
				r.problem("RCP-02", place(item.KeyExpr.Range()), "one of "+strings.Join(gases, ", "), Nearest(name, gases), "there are no data of a gas %q", name)
			}
			if q := r.quantityOf(item.ValueExpr, name, []Dimension{Pressure}); q != nil {
				t.Headspace.PartialPa[name] = q.Value
			}
		}
		return
	}
	kinds := []string{"air", "closed", "nitrogen"}
	if s, at, ok := r.text(body, "headspace"); ok {
		if !contains(kinds, s) {
			r.problem("RCP-02", at, "air, closed, nitrogen or { CO2 = \"40 Pa\" }", Nearest(s, kinds), "there is no headspace %q", s)
			return
		}
		t.Headspace.Kind = s
	}
}

// pair reads ["low", "high"]; an empty text leaves a side open.
func (r *reader) pair(a *hclsyntax.Attribute, name string, want []Dimension) (low, high *Quantity) {
	list, ok := a.Expr.(*hclsyntax.TupleConsExpr)
	if !ok || len(list.Exprs) != 2 {
		r.problem("RCP-03", place(a.Expr.Range()), name+" = [\"low\", \"high\"]", "", "%s is a pair in brackets", name)
		return nil, nil
	}
	side := func(e hclsyntax.Expression) *Quantity {
		if v, ok := r.value(e); !ok || v.Type() == cty.String && strings.TrimSpace(v.AsString()) == "" {
			return nil
		}
		return r.quantityOf(e, name, want)
	}
	return side(list.Exprs[0]), side(list.Exprs[1])
}

func (r *reader) readLiquor(b *hclsyntax.Block) {
	name, at := r.label(b, true)
	r.onlyAttributes(b.Body, "a liquor", []string{"from", "tank", "about"})
	r.onlyBlocks(b.Body, "a liquor", nil)
	l := &LiquorFrom{Name: name, At: at}
	from, fromAt, ok := r.text(b.Body, "from")
	if !ok {
		r.problem("RCP-04", at, "from = \"other.recipe.hcl\"", "", "liquor %q does not say from which recipe", name)
		return
	}
	l.From = from
	l.Tank, _, _ = r.text(b.Body, "tank")
	path := filepath.Join(r.dir, filepath.FromSlash(from))
	abs, _ := filepath.Abs(path)
	switch {
	case !strings.HasSuffix(from, ".recipe.hcl"):
		r.problem("RCP-09", fromAt, "a name that ends in .recipe.hcl", "", "%q is not a recipe", from)
		return
	case !inside(r.o.Root, path):
		r.problem("RCP-09", fromAt, "", "", "%q lies outside the repository of the recipe", from)
		return
	case r.reading[abs]:
		r.problem("RCP-09", fromAt, "", "", "the recipes take liquor from each other in a circle")
		return
	case len(r.reading) > 8:
		r.problem("RCP-08", fromAt, "", "", "recipes take liquor from each other more than 8 deep")
		return
	}
	inner := r.liquors[abs]
	if inner == nil {
		text, err := readFile(path)
		if err != nil {
			r.problem("RCP-01", fromAt, "", "", "%s", err)
			return
		}
		o := r.o
		o.Set = nil
		inner = newReader(o, r.reading)
		inner.liquors = r.liquors
		inner.readRecipe(path, text)
		inner.finish()
		r.liquors[abs] = inner
	}
	for _, p := range inner.problems {
		if p.Fatal {
			r.problem("RCP-01", fromAt, "", "", "%q cannot be used: %s (line %d)", from, p.Message, p.At.Line)
			return
		}
	}
	l.Recipe = inner.recipe
	var names []string
	for _, t := range l.Recipe.Tanks {
		names = append(names, t.Name)
	}
	if !contains(names, l.Tank) {
		r.problem("RCP-02", at, "tank = one of "+strings.Join(names, ", "), Nearest(l.Tank, names), "%q has no tank %q", from, l.Tank)
		return
	}
	for _, in := range l.Recipe.Inputs {
		r.addInput(in)
	}
	r.recipe.Liquors = append(r.recipe.Liquors, l)
}

// ownData reads what a phase and a complex share.
func (r *reader) ownData(b *hclsyntax.Block, at Range) (reaction string, logK float64, enthalpy *float64, table []TempPoint, uncertainty float64, source string) {
	reaction, reactionAt, ok := r.text(b.Body, "reaction")
	if !ok {
		r.problem("RCP-04", at, "reaction = \"AB = A^+ + B^-\"", "", "%s needs its reaction", b.Type)
	} else if _, err := equilibrium.ParseReaction(reaction); err != nil {
		r.problem("RCP-03", reactionAt, "\"AB = A^+ + B^-\"", "", "%s", err)
	}
	k, hasK := r.number(b.Body, "log10_k")
	if h, ok := r.number(b.Body, "enthalpy_kj_mol"); ok {
		enthalpy = &h
	}
	if a := b.Body.Attributes["log10_k_at"]; a != nil {
		if object, ok := a.Expr.(*hclsyntax.ObjectConsExpr); ok {
			for _, item := range object.Items {
				key, known := literalKey(item.KeyExpr)
				if !known {
					continue
				}
				t := r.quantityText(key, place(item.KeyExpr.Range()), "log10_k_at", []Dimension{Temperature})
				v := r.quantityOf(item.ValueExpr, "log10_k_at", []Dimension{Number})
				if t != nil && v != nil {
					table = append(table, TempPoint{t.Value, v.Value})
				}
			}
			sort.Slice(table, func(i, j int) bool { return table[i].TempK < table[j].TempK })
		} else {
			r.problem("RCP-03", place(a.Expr.Range()), "{ \"5 degC\" = -8.2, \"40 degC\" = -8.6 }", "", "log10_k_at is a table in braces")
		}
	}
	if !hasK && len(table) == 0 {
		r.problem("RCP-04", at, "log10_k = -8.48", "", "%s needs log10_k at 25 degC or a table log10_k_at", b.Type)
	}
	uncertainty = 0.3
	if u, ok := r.number(b.Body, "uncertainty"); ok {
		uncertainty = math.Abs(u)
	}
	source, _, ok = r.text(b.Body, "source")
	if !ok || strings.TrimSpace(source) == "" {
		r.problem("RCP-04", at, "source = \"...\"", "", "%s needs the source of its constant", b.Type)
	}
	return reaction, k, enthalpy, table, uncertainty, source
}

var ownAttributes = []string{"reaction", "log10_k", "log10_k_at", "enthalpy_kj_mol", "uncertainty", "source", "about"}

func (r *reader) readOwnPhase(b *hclsyntax.Block) {
	name, at := r.label(b, true)
	r.onlyAttributes(b.Body, "a phase", append([]string{"formula", "forms"}, ownAttributes...))
	r.onlyBlocks(b.Body, "a phase", nil)
	p := &OwnPhase{Name: name, At: at, FromStock: r.stock, Forms: "fast"}
	formula, formulaAt, ok := r.text(b.Body, "formula")
	if !ok {
		r.problem("RCP-04", at, "formula = \"CaSO4.2H2O\"", "", "phase %q needs its formula", name)
	} else if _, err := equilibrium.ParseFormula(formula); err != nil {
		r.problem("RCP-03", formulaAt, "", "", "%s", err)
	}
	p.Formula = formula
	if s, at, ok := r.text(b.Body, "forms"); ok {
		if s != "fast" && s != "slow" {
			r.problem("RCP-02", at, "fast or slow", Nearest(s, []string{"fast", "slow"}), "a phase forms fast or slow, not %q", s)
		}
		p.Forms = s
	}
	p.Reaction, p.Log10K25C, p.EnthalpyKJ, p.Table, p.Uncertainty, p.Source = r.ownData(b, at)
	r.recipe.Phases = append(r.recipe.Phases, p)
}

func (r *reader) readOwnComplex(b *hclsyntax.Block) {
	name, at := r.label(b, true)
	r.onlyAttributes(b.Body, "a complex", ownAttributes)
	r.onlyBlocks(b.Body, "a complex", nil)
	c := &OwnComplex{Name: name, At: at, FromStock: r.stock}
	c.Reaction, c.Log10K25C, c.EnthalpyKJ, c.Table, c.Uncertainty, c.Source = r.ownData(b, at)
	r.recipe.Complexes = append(r.recipe.Complexes, c)
}
