package recipe

import (
	"crypto/sha256"
	"encoding/hex"
	"errors"
	"fmt"
	"path/filepath"
	"sort"
	"strings"
	"time"
	"unicode/utf8"

	"github.com/hashicorp/hcl/v2"
	"github.com/hashicorp/hcl/v2/hclsyntax"
	"github.com/zclconf/go-cty/cty"
)

// Options of reading.
type Options struct {
	Set map[string]string // parameters, and "batch"
	// KnownSubstance and KnownPhase tell what the catalogue and tables hold;
	// Substances and Phases list the names, for the nearest spelling.
	KnownSubstance, KnownPhase func(string) bool
	Substances, Phases         func() []string
	// KnownRule tells which finding codes a waiver may name.
	KnownRule func(string) bool
	Rules     func() []string
	// Root limits what files may be read; "" finds the repository root above the
	// recipe (a folder holding .git), or the recipe's own folder.
	Root string
	// Today decides which waivers have passed; the zero time checks none.
	Today time.Time
}

// Load reads the recipe file at path. Problems are told all at once; the recipe
// is nil only when nothing usable was read.
func Load(path string, o Options) (*Recipe, []Problem) {
	text, err := readFile(path)
	if err != nil {
		return nil, []Problem{{Code: "RCP-01", Level: Stop, Fatal: true, Message: err.Error(), At: Range{File: path, Line: 1, Column: 1, EndLine: 1, EndColumn: 1}}}
	}
	return LoadBytes(path, text, o)
}

// LoadBytes reads a recipe from memory; path is what places name and what
// relative paths start from.
func LoadBytes(path string, text []byte, o Options) (*Recipe, []Problem) {
	if o.Root == "" {
		o.Root = repositoryRoot(path)
	}
	r := newReader(o, map[string]bool{})
	r.readRecipe(path, text)
	r.finish()
	return r.recipe, r.problems
}

type reader struct {
	o              Options
	recipe         *Recipe
	problems       []Problem
	reading        map[string]bool // files being read, absolute, to find circles
	read           map[string]bool // stock files read
	context        *hcl.EvalContext
	usedParameters map[string]bool
	stock          bool // the file being read is a stock file
	dir            string
	liquors        map[string]*reader // recipes read for their liquor, by path: each once
}

func newReader(o Options, reading map[string]bool) *reader {
	return &reader{liquors: map[string]*reader{}, o: o, recipe: &Recipe{Repeat: 1}, reading: reading, read: map[string]bool{}, usedParameters: map[string]bool{}}
}

func (r *reader) problem(code string, at Range, expected, nearest, format string, args ...any) {
	if len(r.problems) >= mostProblems {
		if len(r.problems) == mostProblems {
			r.problems = append(r.problems, Problem{Code: "RCP-08", Level: Stop, Fatal: true, Message: furtherProblems, At: at})
		}
		return
	}
	r.problems = append(r.problems, Problem{Code: code, Level: Stop, Fatal: true, Message: fmt.Sprintf(format, args...), Expected: expected, Nearest: nearest, At: at})
}

// advice is a problem that leaves the recipe usable.
func (r *reader) advice(code string, level Level, at Range, format string, args ...any) {
	r.problems = append(r.problems, Problem{Code: code, Level: level, Message: fmt.Sprintf(format, args...), At: at})
}

const furtherProblems = "further problems of this file are not listed"

func place(h hcl.Range) Range {
	return Range{h.Filename, h.Start.Line, h.Start.Column, h.End.Line, h.End.Column, h.Start.Byte, h.End.Byte}
}

// parse guards and parses one file.
func (r *reader) parse(path string, text []byte) (*hclsyntax.Body, bool) {
	sum := sha256.Sum256(text)
	r.addInput(Input{path, hex.EncodeToString(sum[:])})
	text = []byte(strings.TrimPrefix(string(text), "\ufeff"))
	if p := scan(path, text); p != nil {
		r.problems = append(r.problems, *p)
		return nil, false
	}
	file, diagnostics := hclsyntax.ParseConfig(text, path, hcl.InitialPos)
	for _, d := range diagnostics {
		if d.Severity == hcl.DiagError {
			at := Range{File: path, Line: 1, Column: 1}
			if d.Subject != nil {
				at = place(*d.Subject)
			}
			r.problem("RCP-01", at, "", "", "this cannot be read as a recipe: %s", plainSyntax(d))
			return nil, false
		}
	}
	return file.Body.(*hclsyntax.Body), true
}

// plainSyntax says a syntax error in our words.
func plainSyntax(d *hcl.Diagnostic) string {
	s := strings.ToLower(d.Summary)
	switch {
	case strings.Contains(s, "string") || strings.Contains(s, "template") || strings.Contains(s, "newline"):
		return "a quoted text does not end on its line, or a line break is missing"
	case strings.Contains(s, "duplicate") || strings.Contains(s, "redefined"):
		return "an attribute stands twice here"
	case strings.Contains(s, "block") || strings.Contains(s, "brace"):
		return "a block is not well formed: a word, a name in quotes and {, with one attribute on the line or each on its own"
	case strings.Contains(s, "argument") || strings.Contains(s, "attribute"):
		return "expected NAME = VALUE or a block here"
	case strings.Contains(s, "bracket") || strings.Contains(s, "paren") || strings.Contains(s, "delimiter"):
		return "a bracket is not closed"
	case strings.Contains(s, "character") || strings.Contains(s, "token"):
		return "a character that does not belong here"
	}
	return "expected a value here"
}

// addInput lists a file once.
func (r *reader) addInput(in Input) {
	for _, old := range r.recipe.Inputs {
		if old == in {
			return
		}
	}
	r.recipe.Inputs = append(r.recipe.Inputs, in)
}

func (r *reader) readRecipe(path string, text []byte) {
	r.recipe.File = path
	abs, _ := filepath.Abs(path)
	r.reading[abs] = true
	defer delete(r.reading, abs)
	r.dir = filepath.Dir(path)
	body, ok := r.parse(path, text)
	if !ok {
		r.recipe = nil
		return
	}
	r.readBody(body, []string{"recipe", "parameter", "water", "material", "liquor", "phase", "complex", "tank", "stage", "waive"})
	heads := blocksOf(body, "recipe")
	switch {
	case len(heads) == 0:
		r.problem("RCP-04", Range{File: path, Line: 1, Column: 1, EndLine: 1, EndColumn: 1}, "recipe \"name\" { }", "", "the file has no recipe block")
	case len(heads) > 1:
		r.problem("RCP-05", place(heads[1].DefRange()), "", "", "a second recipe block; one file holds one recipe")
	}
	r.readParameters(body)
	if len(heads) > 0 {
		r.readHead(heads[0])
	}
	r.readThings(body)
	r.linkTanks()
	for _, b := range blocksOf(body, "waive") {
		if w := r.waiver(b); w != nil {
			r.recipe.Waivers = append(r.recipe.Waivers, w)
		}
	}
	for _, b := range blocksOf(body, "stage") {
		r.readStage(b)
	}
	if len(blocksOf(body, "stage")) == 0 {
		r.problem("RCP-04", r.recipe.At, "stage \"name\" { }", "", "the recipe has no stage")
	}
}

// readBody checks that a body holds only the blocks named and no attribute.
func (r *reader) readBody(body *hclsyntax.Body, blocks []string) {
	r.onlyAttributes(body, "the file", nil)
	r.onlyBlocks(body, "the file", blocks)
}

func (r *reader) onlyAttributes(body *hclsyntax.Body, where string, known []string) {
	for _, a := range sortedAttributes(body) {
		if !contains(known, a.Name) {
			expected := ""
			if len(known) > 0 && Nearest(a.Name, known) == "" {
				expected = "one of " + strings.Join(known, ", ")
			}
			r.problem("RCP-02", place(a.NameRange), expected, Nearest(a.Name, known), "%s has no attribute %q", where, a.Name)
		}
	}
}

func (r *reader) onlyBlocks(body *hclsyntax.Body, where string, known []string) {
	for _, b := range body.Blocks {
		if !contains(known, b.Type) {
			expected := ""
			if Nearest(b.Type, known) == "" && len(known) > 0 {
				expected = "one of " + strings.Join(known, ", ")
			}
			r.problem("RCP-02", place(b.TypeRange), expected, Nearest(b.Type, known), "%s has no block %q", where, b.Type)
		}
	}
}

func sortedAttributes(body *hclsyntax.Body) []*hclsyntax.Attribute {
	out := make([]*hclsyntax.Attribute, 0, len(body.Attributes))
	for _, a := range body.Attributes {
		out = append(out, a)
	}
	sort.Slice(out, func(i, j int) bool { return out[i].NameRange.Start.Byte < out[j].NameRange.Start.Byte })
	return out
}

func blocksOf(body *hclsyntax.Body, kind string) []*hclsyntax.Block {
	var out []*hclsyntax.Block
	for _, b := range body.Blocks {
		if b.Type == kind {
			out = append(out, b)
		}
	}
	return out
}

func contains(list []string, s string) bool {
	for _, x := range list {
		if x == s {
			return true
		}
	}
	return false
}

// label is the one name of a block.
func (r *reader) label(b *hclsyntax.Block, needed bool) (string, Range) {
	switch {
	case len(b.Labels) > 1:
		r.problem("RCP-04", place(b.LabelRanges[1]), "", "", "%s takes one name in quotes", b.Type)
	case len(b.Labels) == 0 && needed:
		r.problem("RCP-04", place(b.TypeRange), b.Type+" \"name\" { }", "", "%s needs a name in quotes", b.Type)
		return "", place(b.DefRange())
	case len(b.Labels) == 1 && !needed:
		r.problem("RCP-04", place(b.LabelRanges[0]), "", "", "%s takes no name", b.Type)
	}
	if len(b.Labels) == 0 {
		return "", place(b.DefRange())
	}
	if needed && strings.TrimSpace(b.Labels[0]) == "" {
		r.problem("RCP-04", place(b.LabelRanges[0]), "", "", "the name of %s is empty", b.Type)
	}
	at := place(b.LabelRanges[0])
	return b.Labels[0], at
}

// text of an attribute, "" when it is missing or wrong.
func (r *reader) text(body *hclsyntax.Body, name string) (string, Range, bool) {
	a := body.Attributes[name]
	if a == nil {
		return "", Range{}, false
	}
	at := place(a.Expr.Range())
	v, ok := r.value(a.Expr)
	if !ok {
		return "", at, false
	}
	if v.Type() != cty.String {
		r.problem("RCP-03", at, name+" = \"...\"", "", "%s is a text in quotes", name)
		return "", at, false
	}
	return v.AsString(), at, true
}

func (r *reader) truth(body *hclsyntax.Body, name string) bool {
	a := body.Attributes[name]
	if a == nil {
		return false
	}
	v, ok := r.value(a.Expr)
	if ok && v.Type() != cty.Bool {
		r.problem("RCP-03", place(a.Expr.Range()), "true or false", "", "%s is true or false", name)
		return false
	}
	return ok && v.True()
}

// number of an attribute, written bare or in quotes.
func (r *reader) number(body *hclsyntax.Body, name string) (float64, bool) {
	q := r.quantity(body, name, Number)
	if q == nil {
		return 0, false
	}
	return q.Value, true
}

// quantity of an attribute, nil when it is missing or wrong.
func (r *reader) quantity(body *hclsyntax.Body, name string, want ...Dimension) *Quantity {
	a := body.Attributes[name]
	if a == nil {
		return nil
	}
	return r.quantityOf(a.Expr, name, want)
}

func (r *reader) quantityOf(expr hclsyntax.Expression, name string, want []Dimension) *Quantity {
	v, ok := r.value(expr)
	if !ok {
		return nil
	}
	at := valueRange(expr)
	if v.Type() == cty.Number {
		if !has(want, Number) {
			r.problem("RCP-03", at, expected(want), "", "%s is a bare number; it needs a unit", name)
			return nil
		}
		f, _ := v.AsBigFloat().Float64()
		if f != f || f > 1e15 || f < -1e15 {
			r.problem("RCP-03", at, expected(want), "", "%s is not a usable number", name)
			return nil
		}
		return &Quantity{Value: f, Dimension: Number, Text: fmt.Sprint(f), At: at}
	}
	if v.Type() != cty.String {
		r.problem("RCP-03", at, expected(want), "", "%s is not an amount", name)
		return nil
	}
	return r.quantityText(v.AsString(), at, name, want)
}

// quantityText reads the text of an amount; per-batch amounts are multiplied out.
func (r *reader) quantityText(text string, at Range, name string, want []Dimension) *Quantity {
	all := want
	perBatch := has(want, Mass) && has(want, Volume) && r.recipe.Batch != nil && name != "to"
	if perBatch {
		all = append(append([]Dimension{}, want...), MassPerVolume, MolPerVolume, MassFraction)
	}
	q, err := parseQuantity(text, all)
	if err != nil {
		if perBatch { // say what is usual, not all that is possible
			if _, usual := parseQuantity(text, want); usual != nil {
				err = usual
			}
		}
		var wrong *wrongPart
		if errors.As(err, &wrong) {
			if at.Line == at.EndLine && at.EndByte-at.Byte == len(text) {
				at = within(at, text, wrong.from, wrong.to)
			}
			r.problem("RCP-03", at, "", wrong.nearest, "%s: %s", name, wrong.message)
		}
		return nil
	}
	q.At = at
	if perBatch && !has(want, q.Dimension) {
		r.timesBatch(&q)
	}
	return &q
}

func (r *reader) timesBatch(q *Quantity) {
	size, to := r.recipe.Batch.Value, Mass
	kindOfBatch := Volume
	switch q.Dimension {
	case MolPerVolume:
		to = Amount
	case MassFraction:
		kindOfBatch = Mass
	}
	if r.recipe.Batch.Dimension != kindOfBatch {
		r.problem("RCP-03", q.At, "", "", "%q is per %s, and the batch is given as %s", q.Text, kindName(kindOfBatch), kindName(r.recipe.Batch.Dimension))
		return
	}
	q.Value, q.Minus, q.Plus = q.Value*size, q.Minus*size, q.Plus*size
	q.Dimension, q.PerBatch = to, true
}

// within narrows a range on one line to a part of its text.
func within(at Range, text string, from, to int) Range {
	if from < 0 || to > len(text) || from > to {
		return at
	}
	out := at
	out.Byte, out.EndByte = at.Byte+from, at.Byte+to
	out.Column = at.Column + utf8.RuneCountInString(text[:from])
	out.EndColumn = at.Column + utf8.RuneCountInString(text[:to])
	return out
}

// valueRange is the place of a value, without the quotes of a plain text.
func valueRange(expr hclsyntax.Expression) Range {
	if t, ok := expr.(*hclsyntax.TemplateExpr); ok && len(t.Parts) == 1 {
		return place(t.Parts[0].Range())
	}
	return place(expr.Range())
}
