package main

import (
	"fmt"
	"io"
	"math"
	"sort"
	"strings"

	"dregs/checks"
	"dregs/recipe"
)

// checkScreen lays the verdicts out as a batch record would: a head a recipe, its
// stages, the steps that something is found at, and the verdict under the line.
func (c *call) checkScreen(verdicts []*verdict) {
	p := c.page()
	for _, v := range verdicts {
		p.recipe(v)
	}
	if len(verdicts) > 1 {
		p.total(verdicts)
	}
	p.caution()
	io.WriteString(c.out, p.String())
}

// recipe prints one verdict; a clear one in two lines.
func (p *page) recipe(v *verdict) {
	p.rule("═")
	p.ends(v.name(), v.head, p.strong)
	if v.title != "" && v.file != "-" {
		p.line(p.faint.Sprint(printable(v.file)))
	}
	stage, at, open := "", recipe.Range{}, false
	for i, f := range inReadingOrder(v) {
		if i == 0 || f.Stage != stage {
			stage, open = f.Stage, false
			p.rule("─")
			p.line(printable(stageText(f)))
		}
		if !open || f.At != at {
			at, open = f.At, true
			p.step(v, f)
		}
		p.finding(f, v.model)
	}
	if len(v.findings) > 0 {
		p.rule("─")
	}
	p.verdictLine(v)
	p.line()
}

func stageText(f checks.Finding) string {
	if f.Stage == "" {
		return "recipe as a whole"
	}
	return "stage " + f.Stage
}

// headText is what stands beside the name of a recipe.
func headText(r *recipe.Recipe) string {
	var parts []string
	if r.Revision != "" {
		parts = append(parts, "revision "+r.Revision)
	}
	if r.Batch != nil {
		parts = append(parts, "batch "+unitText(r.Batch.Text))
	}
	if r.Repeat > 1 {
		parts = append(parts, fmt.Sprintf("%d batches", r.Repeat))
	}
	return strings.Join(parts, ", ")
}

// inReadingOrder puts what belongs to no stage first; findings are in the order
// of the file already.
func inReadingOrder(v *verdict) []checks.Finding {
	out := append([]checks.Finding{}, v.findings...)
	sort.SliceStable(out, func(i, j int) bool { return out[i].Stage == "" && out[j].Stage != "" })
	return out
}

const (
	marginWidth = 9  // where lines and levels stand
	codeWidth   = 10 // of a finding's code
	labelWidth  = 13 // of a finding's figures
)

func (p *page) step(v *verdict, f checks.Finding) {
	p.line()
	margin := ""
	if f.At.Line > 0 {
		margin = fmt.Sprintf("line %d", f.At.Line)
	}
	if f.At.File != v.file && f.At.File != "" {
		margin, f.Step = "", fmt.Sprintf("%s, line %d  %s", f.At.File, f.At.Line, f.Step)
	}
	note, ok := v.steps[f.At]
	if !ok {
		p.hang(0, margin, marginWidth, f.Step, nil)
		return
	}
	p.hang(0, margin, marginWidth, note.text, p.strong)
	if note.state != "" {
		p.hang(marginWidth, note.tank+" after it", length(note.tank)+11, note.state, p.faint)
	}
}

// finding prints the sentence and, under it, the figures it rests on.
func (p *page) finding(f checks.Finding, model string) {
	p.line()
	level := f.Level.String()
	ink := p.ink(f.Level)
	if f.Waived != nil {
		level, ink = "waived", p.faint
	}
	for i, text := range wrap(ionsInText(f.Message), p.width-marginWidth-codeWidth) {
		margin := strings.Repeat(" ", marginWidth+codeWidth)
		if i == 0 {
			margin = ink.Sprint(level) + strings.Repeat(" ", marginWidth-len(level)) + pad(f.Code, codeWidth)
		}
		p.line(margin, text)
	}
	row := func(label, text string) {
		if text != "" {
			p.hang(marginWidth, label, labelWidth, text, p.faint)
		}
	}
	if f.Phase != "" {
		solid := f.Phase
		if f.Formula != "" {
			solid += "  " + ionText(f.Formula)
		}
		row("solid", solid)
	}
	row("amount", amountText(f))
	if !math.IsNaN(f.Index) {
		row("index", indexText(f.Index, f.Uncertainty))
	}
	if !math.IsNaN(f.Probability) {
		row("probability", percentText(f.Probability))
	}
	if !math.IsNaN(f.Onset) {
		row("begins", fmt.Sprintf("at %s %% of the step", fixed(100*f.Onset, 0)))
	}
	row("limited by", ionsInText(strings.Join(f.Limits, "; ")))
	label := "rests on"
	for _, e := range f.Evidence {
		if e = withoutModel(e, model); e != "" {
			row(label, e)
			label = ""
		}
	}
	label = "way out"
	for _, r := range f.Remedies {
		if r.Verified {
			row(label, r.Text)
			label = ""
		}
	}
	if f.Waived != nil {
		row("waived", waiverText(f.Waived))
	}
}

// withoutModel leaves out the model, which stands under the line, and keeps what
// is outside its range.
func withoutModel(evidence, model string) string {
	rest, ok := strings.CutPrefix(evidence, model)
	if !ok || model == "" {
		return evidence
	}
	rest = strings.TrimLeft(rest, "; ")
	if reason, ok := strings.CutPrefix(rest, "outside it: "); ok {
		return "outside the range of the model: " + reason
	}
	return rest
}

func amountText(f checks.Finding) string {
	switch {
	case math.IsNaN(f.AmountG) && math.IsNaN(f.AmountGPerL):
		return ""
	case math.IsNaN(f.AmountGPerL):
		return massText(f.AmountG)
	case math.IsNaN(f.AmountG):
		return strengthText(f.AmountGPerL)
	}
	return massText(f.AmountG) + ", " + strengthText(f.AmountGPerL)
}

func waiverText(w *recipe.Waiver) string {
	text := w.Because
	if w.Until != "" {
		text += ", until " + w.Until
	}
	if w.Reference != "" {
		text += ", " + w.Reference
	}
	return text
}

// tally counts findings by level, waived ones apart.
func tally(list []checks.Finding) (count map[recipe.Level]int, waived int) {
	count = map[recipe.Level]int{}
	for _, f := range list {
		if f.Waived != nil {
			waived++
		} else {
			count[f.Level]++
		}
	}
	return count, waived
}

func tallyText(list []checks.Finding) string {
	count, waived := tally(list)
	var parts []string
	for _, level := range []recipe.Level{recipe.Stop, recipe.Caution, recipe.Note} {
		if n := count[level]; n > 0 {
			parts = append(parts, counted(n, level.String()))
		}
	}
	if waived > 0 {
		parts = append(parts, fmt.Sprintf("%d waived", waived))
	}
	return strings.Join(parts, ", ")
}

func counted(n int, word string) string {
	if n == 1 {
		return "1 " + word
	}
	return fmt.Sprintf("%d %ss", n, word)
}

func (p *page) verdictLine(v *verdict) {
	switch {
	case !v.usable():
		p.line(p.stop.Sprint("cannot be used"), ": ", counted(len(v.faults), "fault"), " on standard error")
	case len(v.findings) == 0:
		text := "clear, nothing found"
		if v.closest != "" {
			text += "; closest solid " + v.closest
		}
		p.hang(0, "", 0, text, nil)
	default:
		verdict := "clear"
		if worst := v.worst(); worst > 0 {
			verdict = p.ink(worst).Sprint(worst.String())
		}
		p.line(pad("verdict", marginWidth), verdict, ": ", tallyText(v.findings))
		p.hang(0, "model", marginWidth, v.model, p.faint)
	}
}

// total counts recipes by their worst finding.
func (p *page) total(verdicts []*verdict) {
	count := map[recipe.Level]int{}
	unusable := 0
	for _, v := range verdicts {
		if v.usable() {
			count[v.worst()]++
		} else {
			unusable++
		}
	}
	p.rule("═")
	text := counted(len(verdicts), "recipe") + fmt.Sprintf(": %d with a stop, %d with a caution, %d with notes only, %d clear", count[recipe.Stop], count[recipe.Caution], count[recipe.Note], count[0])
	if unusable > 0 {
		text += fmt.Sprintf(", %d that cannot be used", unusable)
	}
	for _, row := range wrap(text, p.width) {
		p.line(row)
	}
}
