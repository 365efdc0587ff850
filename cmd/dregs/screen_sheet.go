package main

import (
	"fmt"
	"io"
	"strings"

	"dregs/equilibrium"
	"dregs/recipe"
	"dregs/recipe/trace"
)

// wideSheet is the width from which the closest solids have a column of their own.
const wideSheet = 130

// sheetScreen prints the batch as a table, stage by stage.
func (c *call) sheetScreen(v *verdict) {
	p := c.page()
	sys := v.trace.System
	p.rule("═")
	p.ends(v.name(), v.head, p.strong)
	p.line(p.faint.Sprint(printable(v.file)))
	rows, stages, near := sheetRows(sys, v.trace.Steps)
	columns := []column{{head: "line", right: true}, {head: "step"}, {head: "tank"}, {head: "min", right: true}, {head: "°C", right: true},
		{head: "L", right: true}, {head: "kg", right: true, drop: 2}, {head: "pH", right: true}, {head: "I mol/kg", right: true}, {head: "solids"}}
	if p.width >= wideSheet {
		columns = append(columns, column{head: "closest solids, saturation index"})
		for i := range rows {
			rows[i] = append(rows[i], near[i])
		}
	}
	p.batchTable(columns, rows, stages, near)
	p.rule("─")
	p.hang(0, "model", 7, sys.ModelName(), p.faint)
	p.outside(sys, v.trace.Steps)
	p.missing(v.trace)
	p.line("min counts to the end of the step; I is the ionic strength; L is with solids")
	p.caution()
	io.WriteString(c.out, p.String())
}

func sheetRows(sys *equilibrium.System, steps []*trace.Step) (rows [][]string, stages, near []string) {
	for _, s := range steps {
		l, stage := s.After, "before the first stage"
		if s.Stage != nil {
			stage = "stage " + s.Stage.Name
		}
		what := writtenStep(s)
		if s.Source != nil && s.Source.Kind != recipe.Together {
			what = strings.ReplaceAll(s.What, "_", " ")
			if amount := s.Source.Amount; amount != nil {
				what += ", " + unitText(amount.Text)
			} else {
				what = stepText(s.Source)
			}
		}
		row := []string{fmt.Sprint(s.At.Line), what, s.Tank.Name, fixed(s.End, 0), fixed(l.TempK-equilibrium.ZeroCelsius, 1), figures(l.VolumeL, 4), figures(l.MassKg, 4), "-", "-", solidsText(sys, l)}
		if l.State.WaterKg > 0 {
			row[7], row[8] = fixed(l.State.PH, 2), ionicText(l.State.IonicStrength)
		}
		rows, stages = append(rows, row), append(stages, stage)
		near = append(near, nearText(closestOf(sys, s)))
	}
	return rows, stages, near
}

func solidsText(sys *equilibrium.System, l *trace.Liquor) string {
	var parts []string
	for _, s := range l.Solids {
		parts = append(parts, sys.Phases[s.Phase].Name+" "+massText(1000*s.Kg))
	}
	if l.InertKg > 0 {
		parts = append(parts, "inert "+massText(1000*l.InertKg))
	}
	if len(parts) == 0 {
		return "none"
	}
	return strings.Join(parts, ", ")
}

// batchTable is a table with a line at every stage; long steps and solids break
// within their cells, and on a narrow page the closest solids stand under a step.
func (p *page) batchTable(columns []column, rows [][]string, stages, near []string) {
	widths := p.fit(columns, rows)
	write := func(cells [][]string) {
		for k := 0; ; k++ {
			var parts []string
			more := false
			for i := range columns {
				if widths[i] == 0 {
					continue
				}
				text := ""
				if k < len(cells[i]) {
					text, more = cells[i][k], true
				}
				if columns[i].right {
					parts = append(parts, pad(text, -widths[i]))
				} else {
					parts = append(parts, pad(text, widths[i]))
				}
			}
			if !more {
				return
			}
			p.line(strings.Join(parts, "  "))
		}
	}
	stage := ""
	p.rule("─")
	var head [][]string
	for _, c := range columns {
		head = append(head, []string{c.head})
	}
	write(head)
	for i, row := range rows {
		if stages[i] != stage {
			stage = stages[i]
			p.rule("─")
			p.line(p.strong.Sprint(printable(stage)))
		}
		var cells [][]string
		for k, text := range row {
			cells = append(cells, wrap(text, max(widths[k], 1)))
		}
		write(cells)
		if p.width < wideSheet && near[i] != "" {
			p.hang(6, "closest", 9, near[i], p.faint)
		}
	}
}

// fit gives each column its width: figures what they need, words what is left.
func (p *page) fit(columns []column, rows [][]string) []int {
	const leastWords = 14
	widths := make([]int, len(columns))
	words, taken := 0, 2*(len(columns)-1)
	for i, c := range columns {
		widths[i] = length(c.head)
		for _, row := range rows {
			widths[i] = max(widths[i], length(row[i]))
		}
		if isWords(c) {
			words++
		} else {
			taken += widths[i]
		}
	}
	for i, c := range columns {
		if c.drop > 0 && p.width-taken < 24*words {
			taken -= widths[i] + 2
			widths[i] = 0
		}
	}
	left := p.width - taken
	for i, c := range columns { // first those that need less than their share
		if isWords(c) && widths[i] <= left/max(words, 1) {
			left -= widths[i]
			words--
		}
	}
	for i, c := range columns {
		if isWords(c) && words > 0 && widths[i] > left/words {
			widths[i] = max(left/words, leastWords)
		}
	}
	return widths
}

func isWords(c column) bool {
	return c.head == "step" || c.head == "solids" || strings.HasPrefix(c.head, "closest")
}

// outside tells where the activity model is used beyond its range: the first
// place with its reason, and how many more there are.
func (p *page) outside(sys *equilibrium.System, steps []*trace.Step) {
	first, more := "", 0
	for _, s := range steps {
		if s.After == nil || s.After.State.WaterKg <= 0 {
			continue
		}
		if inside, reason := sys.ModelRange(s.After.State); inside {
			continue
		} else if first == "" {
			first = fmt.Sprintf("beyond its range at line %d: %s", s.At.Line, reason)
		} else {
			more++
		}
	}
	if more > 0 {
		first += fmt.Sprintf(" (and at %s)", counted(more, "further step"))
	}
	if first != "" {
		p.hang(7, "", 0, first, nil)
	}
}

func (p *page) missing(tr *trace.Trace) {
	for i, m := range tr.Missing {
		label := ""
		if i == 0 {
			label = "lacks"
		}
		p.hang(0, label, 7, m.What+": "+m.Why, p.faint)
	}
}
