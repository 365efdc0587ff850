package main

import (
	"fmt"
	"io"
	"math"
	"slices"
	"strings"

	"dregs/equilibrium"
	"dregs/recipe/trace"
)

// dissolving is a charged solid and what became of it.
type dissolving struct {
	name, formula           string
	chargedG, leftG, litres float64
	elsewhere               []string // solids that hold part of what dissolved
}

// goneG is what is no longer there as the solid; less than a billionth is rounding.
func (d dissolving) goneG() float64 {
	if gone := d.chargedG - d.leftG; gone > 1e-9*d.chargedG {
		return gone
	}
	return 0
}

// perL is that in a litre of solution, NaN without one.
func (d dissolving) perL() float64 {
	if d.litres <= 0 {
		return math.NaN()
	}
	return d.goneG() / d.litres
}

// becameOf sums what was charged of each solid and what of it still stands there.
func (m *mix) becameOf() []dissolving {
	var out []dissolving
	at := map[int]int{} // first phase of the charge to its row
	for _, s := range m.trace.Steps {
		if s.Charged == nil || len(s.Charged.SolidPhases) == 0 || s.ChargedMol <= 0 {
			continue
		}
		first := s.Charged.SolidPhases[0]
		phase := m.trace.System.Phases[first]
		grams := 1000 * s.ChargedMol * phase.MolarMass / 1000
		if row, ok := at[first]; ok {
			out[row].chargedG += grams
			continue
		}
		at[first] = len(out)
		d := dissolving{name: s.Charged.Name, formula: phase.Formula, chargedG: grams, litres: m.final.After.SolutionL}
		for _, p := range s.Charged.SolidPhases {
			for _, solid := range m.final.After.Solids {
				if solid.Phase == p {
					d.leftG += 1000 * solid.Kg
				}
			}
		}
		d.elsewhere = m.elsewhere(s.Charged)
		out = append(out, d)
	}
	return out
}

// elsewhere names the solids, other than the charge itself, that hold something
// the charge has brought.
func (m *mix) elsewhere(c *trace.Charged) []string {
	brought := map[string]bool{}
	for _, part := range c.Parts {
		if part.Component != "H2O" && part.Component != "H^+" {
			brought[part.Component] = true
		}
	}
	var out []string
	for _, solid := range m.final.After.Solids {
		if slices.Contains(c.SolidPhases, solid.Phase) {
			continue
		}
		phase := m.trace.System.Phases[solid.Phase]
		if slices.ContainsFunc(phase.Parts, func(p equilibrium.Part) bool { return brought[p.Component] }) {
			out = append(out, phase.Name)
		}
	}
	return out
}

const speciesShown = 12

func (c *call) beakerScreen(m *mix) {
	p := c.page()
	sys, l := m.trace.System, m.final.After
	st := l.State
	var mixed []string
	for _, s := range m.trace.Recipe.Stages[0].Steps {
		if s.Amount != nil {
			mixed = append(mixed, unitText(s.Amount.Text)+" "+s.What)
		}
	}
	p.rule("═")
	p.hang(0, "", 0, strings.Join(mixed, " + "), nil)
	p.line(p.faint.Sprintf("at %s °C, headspace %s", fixed(l.TempK-equilibrium.ZeroCelsius, 1), m.air))
	p.rule("─")
	row := func(label, text string) { p.hang(0, label, 18, text, p.faint) }
	if st.WaterKg > 0 {
		row("pH", fixed(st.PH, 2))
		row("ionic strength", ionicText(st.IonicStrength)+" mol/kg")
		row("water activity", fixed(st.WaterActivity, 4))
		row("density", fixed(sys.SolutionMassKg(st)/l.SolutionL, 4)+" kg/L without solids")
	}
	row("volume", volumeText(l.VolumeL)+" with solids")
	row("mass", figures(l.MassKg, 5)+" kg")
	p.dissolved(m)
	row("solids", solidsText(sys, l))
	row("closest solids", orNone(nearText(closest(sys, l, 5))))
	p.species(sys, st)
	p.gases(sys, st)
	p.rule("─")
	row("model", sys.ModelName())
	if inside, reason := sys.ModelRange(st); st.WaterKg > 0 && !inside {
		row("", "beyond its range: "+reason)
	}
	for _, missing := range m.trace.Missing {
		row("lacks", missing.What+": "+missing.Why)
	}
	p.caution()
	io.WriteString(c.out, p.String())
}

func orNone(text string) string {
	if text == "" {
		return "none within reach"
	}
	return text
}

// dissolved prints what became of every solid that was charged.
func (p *page) dissolved(m *mix) {
	list := m.becameOf()
	if len(list) == 0 {
		return
	}
	p.line()
	var rows [][]string
	for _, d := range list {
		rows = append(rows, []string{d.name, ionText(d.formula), massText(d.chargedG), massText(d.goneG()), strengthText(d.perL()), orWord(d.leftG, "nothing")})
	}
	p.table(0, []column{{head: "charged solid"}, {head: "as", drop: 1}, {head: "charged", right: true}, {head: "dissolved", right: true}, {head: "per L of solution", right: true}, {head: "stays", right: true}}, rows)
	for _, d := range list {
		if len(d.elsewhere) > 0 {
			p.hang(0, "", 0, "of "+d.name+", what dissolved stands partly in "+strings.Join(d.elsewhere, ", "), nil)
		}
	}
	p.line()
}

func orWord(massG float64, word string) string {
	if massG == 0 {
		return word
	}
	return massText(massG)
}

// species prints the main dissolved species.
func (p *page) species(sys *equilibrium.System, st *equilibrium.State) {
	order := mainSpecies(st)
	if len(order) == 0 || st.WaterKg <= 0 {
		return
	}
	p.line()
	var rows [][]string
	for _, i := range order[:min(len(order), speciesShown)] {
		rows = append(rows, []string{ionText(sys.Species[i].Name), figures(st.Molality[i], 3), fixed(st.LogActivity10(i), 3)})
	}
	p.table(0, []column{{head: "dissolved as"}, {head: "mol/kg", right: true}, {head: "log10 activity", right: true}}, rows)
	if more := len(order) - speciesShown; more > 0 {
		p.line(p.faint.Sprint(fmt.Sprintf("and %d more, all below %s mol/kg", more, figures(st.Molality[order[speciesShown-1]], 2))))
	}
}

func (p *page) gases(sys *equilibrium.System, st *equilibrium.State) {
	if st.WaterKg <= 0 {
		return
	}
	var rows [][]string
	for g, gas := range sys.Gases {
		if st.GasBar[g] > 0 {
			rows = append(rows, []string{ionText(gas.Name), figures(100*st.GasBar[g], 3)})
		}
	}
	if len(rows) == 0 {
		return
	}
	p.line()
	p.table(0, []column{{head: "gas in balance"}, {head: "kPa", right: true}}, rows)
}
