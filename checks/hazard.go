package checks

import (
	"fmt"
	"sort"

	"dregs/equilibrium"
	"dregs/equilibrium/catalogue"
	"dregs/recipe"
	"dregs/recipe/trace"
)

// deferral ends every message that speaks of danger.
const deferral = "Follow the site's safety procedures."

func runGas(p *Pass) {
	for _, s := range p.Trace.Steps {
		for _, g := range s.GasOut {
			if g.LitresAt20C < p.Thresholds.GasLitres {
				continue
			}
			gas := p.Trace.System.Gases[g.Gas]
			f := blank()
			f.AmountG = g.Mol * gasMass(gas.Name)
			from := s.What
			f.Message = fmt.Sprintf("%s L of %s (at 20 °C) leave the liquor in %q. %s", digits(g.LitresAt20C), gas.Name, from, deferral)
			if gas.Name == "CO2" && s.After != nil && g.LitresAt20C < 0.2*s.After.VolumeL {
				f.Level = recipe.Note
			}
			p.Report(s, f)
		}
	}
	p.toxicPressure()
}

func gasMass(name string) float64 { return equilibrium.MustParseFormula(name).MolarMass() }

// toxicPressure tells liquors above which a toxic gas stands. The pressures are
// those of about 1000 ppm in air; common practice, no source.
func (p *Pass) toxicPressure() {
	told := map[string]bool{}
	for _, s := range p.Trace.Steps {
		if s.After == nil || !(s.After.State.WaterKg > 0) {
			continue
		}
		for g, bar := range s.After.State.GasBar {
			gas := p.Trace.System.Gases[g].Name
			key := s.Tank.Name + gas
			if gas == "CO2" || bar < 1e-3 || told[key] {
				continue
			}
			told[key] = true
			f := blank()
			f.Level = recipe.Note
			if gas != "NH3" {
				f.Level = recipe.Caution
			}
			f.Message = fmt.Sprintf("%s stands over the liquor at %.1f kPa (toxic). %s", gas, bar*100, deferral)
			p.Report(s, f)
		}
	}
}

// toxic are classes whose pairs are a caution; the others are notes.
var toxic = map[string]bool{"cyanide": true, "sulfide": true, "hypochlorite": true, "azide": true, "chlorite": true, "chlorate": true, "thiocyanate": true, "reactive metal": true, "water reactive": true, "concentrated sulfuric acid": true, "peroxide": true, "permanganate": true, "nitric acid": true}

func runPairs(p *Pass) { p.pairs(false) }

func runOrder(p *Pass) { p.pairs(true) }

func (p *Pass) pairs(ordered bool) {
	told := map[string]bool{}
	for _, s := range p.Trace.Steps {
		if s.Charged == nil || s.Before == nil {
			continue
		}
		for _, name := range fromNames(s.Before) {
			other := p.Trace.Materials[name]
			if other == nil || other == s.Charged {
				continue
			}
			for _, pair := range catalogue.Pairs() {
				if pair.Ordered != ordered || !p.meets(pair, s, other, name) {
					continue
				}
				key := s.Tank.Name + pair.A + pair.B
				if told[key] {
					continue
				}
				told[key] = true
				f := blank()
				f.Level = recipe.Note
				if ordered || toxic[pair.A] && pair.A != "nitric acid" || toxic[pair.B] {
					f.Level = recipe.Caution
				}
				f.Message = fmt.Sprintf("%s meets %s: %s. %s %s", s.Charged.Name, name, pair.Gives, pair.Caution, deferral)
				f.Evidence = []string{pair.Source}
				p.Report(s, f)
			}
		}
	}
}

// meets tells whether a charge and what is in the tank make a pair.
func (p *Pass) meets(pair catalogue.Pair, s *trace.Step, other *trace.Charged, name string) bool {
	if pair.AboveC == pair.AboveC && s.Before.TempK-equilibrium.ZeroCelsius < pair.AboveC {
		return false
	}
	share := s.Before.From[name] / s.Before.MassKg
	ph := s.Before.State.PH
	into := is(s.Charged, pair.A) && is(other, pair.B)
	reverse := is(s.Charged, pair.B) && is(other, pair.A)
	if pair.Ordered {
		// what is there must still be what it was: most of the tank
		return into && share > 0.3
	}
	if !into && !reverse {
		return false
	}
	inTank := pair.B
	if reverse && !into {
		inTank = pair.A
	}
	switch inTank { // has it been neutralised since?
	case "acid", "strong acid", "concentrated sulfuric acid", "nitric acid":
		return ph < 7
	case "strong base", "caustic solid", "quicklime":
		return ph > 9
	}
	return true
}

// is tells whether a material belongs to a class. Waters are water although the
// catalogue has no entry of them.
func is(c *trace.Charged, class string) bool {
	if class == "water" && c.Substance == nil && (c.Water != nil || c.Material == nil && len(c.Parts) == 1) {
		return true
	}
	for _, h := range c.Hazards {
		if h == class {
			return true
		}
	}
	return false
}

func fromNames(l *trace.Liquor) []string {
	var out []string
	for name := range l.From {
		out = append(out, name)
	}
	sort.Strings(out)
	return out
}
