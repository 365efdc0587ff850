package main

import "strings"

// codes lists every code by family.
func (p *page) codes() {
	family := ""
	for _, e := range explanations() {
		if f, _, _ := strings.Cut(e.Code, "-"); f != family {
			if family != "" {
				p.line()
			}
			family = f
		}
		level := ""
		if e.Level > 0 {
			level = e.Level.String()
		}
		p.hang(0, pad(e.Code, 9)+pad(level, 9), 18, e.Title, nil)
	}
}

// explain prints one rule: its text keeps its paragraphs.
func (p *page) explain(e explained) {
	p.rule("═")
	level := ""
	if e.Level > 0 {
		level = "usually a " + e.Level.String()
	}
	p.ends(e.Code, level, p.strong)
	p.hang(0, "", 0, e.Title, nil)
	p.rule("─")
	for i, paragraph := range strings.Split(strings.TrimSpace(e.Text), "\n\n") {
		if i > 0 {
			p.line()
		}
		for _, row := range wrap(paragraph, p.width) {
			p.line(row)
		}
	}
}
