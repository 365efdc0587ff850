package main

import "strings"

// column of a table. Those with the greatest Drop are left out first when the
// page is too narrow; 0 always stays.
type column struct {
	head  string
	right bool
	drop  int
}

// table prints rows in aligned columns under a ruled head.
func (p *page) table(indent int, columns []column, rows [][]string) {
	const gap = 2
	widths := make([]int, len(columns))
	for i, c := range columns {
		widths[i] = length(c.head)
		for _, row := range rows {
			widths[i] = max(widths[i], length(row[i]))
		}
	}
	shown := make([]bool, len(columns))
	total := func() int {
		sum := indent - gap
		for i := range columns {
			if shown[i] {
				sum += widths[i] + gap
			}
		}
		return sum
	}
	for i := range shown {
		shown[i] = true
	}
	for total() > p.width {
		worst := -1
		for i, c := range columns {
			if shown[i] && c.drop > 0 && (worst < 0 || c.drop > columns[worst].drop) {
				worst = i
			}
		}
		if worst < 0 {
			break
		}
		shown[worst] = false
	}
	write := func(cell func(i int) string) string {
		var parts []string
		for i, c := range columns {
			if !shown[i] {
				continue
			}
			if c.right {
				parts = append(parts, pad(cell(i), -widths[i]))
			} else {
				parts = append(parts, pad(cell(i), widths[i]))
			}
		}
		return strings.TrimRight(strings.Repeat(" ", indent)+strings.Join(parts, strings.Repeat(" ", gap)), " ")
	}
	p.line(p.faint.Sprint(write(func(i int) string { return columns[i].head })))
	for _, row := range rows {
		p.line(printable(write(func(i int) string { return row[i] })))
	}
}
