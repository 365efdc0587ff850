package checks

import (
	"fmt"
	"math"
	"sort"
	"strings"

	"dregs/equilibrium"
	"dregs/recipe"
	"dregs/recipe/trace"
)

// newSolid is a solid that a step brings down.
type newSolid struct {
	step   *trace.Step
	phase  int
	mol    float64
	liquor *trace.Liquor
	tank   string
}

// newSolids lists what comes down and is neither planned nor the charge itself.
// A solid that only stays, or travels, is not new.
func (p *Pass) newSolids() []newSolid {
	var out []newSolid
	content := map[*recipe.Tank]*trace.Liquor{}
	told := map[string]float64{} // mol told so far, by tank and phase
	// news tells whether so much of a phase is new to a tank, or half as much again
	// as was told of before.
	news := func(t *recipe.Tank, phase int, mol float64) bool {
		key := fmt.Sprint(t.Name, "|", phase)
		if mol <= 1.5*told[key] {
			return false
		}
		told[key] = mol
		return true
	}
	for _, s := range p.Trace.Steps {
		if s.After != nil {
			for _, solid := range s.After.Solids {
				before := molOf(s.Before, solid.Phase)
				if ofCharge(s, solid.Phase) || solid.Mol <= before*1.1 || p.planned(solid.Phase, s) || !news(s.Tank, solid.Phase, solid.Mol) {
					continue
				}
				out = append(out, newSolid{s, solid.Phase, solid.Mol - before, s.After, ""})
			}
			content[s.Tank] = s.After
			for i := range p.Trace.System.Phases {
				if molOf(s.After, i) == 0 {
					delete(told, fmt.Sprint(s.Tank.Name, "|", i)) // gone: the next time is news
				}
			}
		}
		if s.Into != nil && s.IntoAfter != nil {
			for _, solid := range s.IntoAfter.Solids {
				before := molOf(content[s.Into], solid.Phase)
				for _, c := range s.Carried {
					if c.Phase == solid.Phase {
						before += c.Mol
					}
				}
				if solid.Mol > before*1.1 && !p.planned(solid.Phase, s) && news(s.Into, solid.Phase, solid.Mol) {
					out = append(out, newSolid{s, solid.Phase, solid.Mol - before, s.IntoAfter, s.Into.Name})
				}
			}
			content[s.Into] = s.IntoAfter
		}
	}
	return out
}

// mild tells a solid whose oversaturation lies inside the zone where it may stay
// away for a while.
func (p *Pass) mild(n newSolid) bool {
	ph := p.Trace.System.Phases[n.phase]
	zone := p.Thresholds.ZoneSparing
	if verySoluble(ph, n.liquor.TempK) {
		zone = p.Thresholds.ZoneSoluble
	}
	for _, s := range []*trace.Liquor{n.step.Before} {
		if molOf(s, n.phase) > 0 {
			return false // crystals are there: nothing holds it back
		}
	}
	return n.liquor.Clear != nil && n.liquor.Clear.Index[n.phase] < zone
}

func doing(s *trace.Step) string {
	if s.Source == nil {
		return "in the heel"
	}
	name := s.Source.What
	switch s.Source.Kind {
	case recipe.Charge:
		return "when " + name + " is charged"
	case recipe.Dose:
		return "while " + name + " is dosed"
	case recipe.Heat:
		return "on heating"
	case recipe.Cool:
		return "on cooling"
	case recipe.Adjust:
		return "while the pH is adjusted"
	case recipe.MakeUp:
		return "on making up"
	case recipe.Evaporate:
		return "on evaporating"
	case recipe.Transfer:
		return "on transfer"
	case recipe.Hold, recipe.Age:
		return "while it stands"
	}
	return "in this step"
}

func runUnplanned(p *Pass) {
	for _, n := range p.newSolids() {
		if p.Trace.System.Phases[n.phase].Forms == equilibrium.FormsSlow || p.mild(n) {
			continue // SOL-05, SAT-02
		}
		f := p.ofSolid(n.phase, n.mol, n.liquor)
		f.Tank = n.tank
		more := ""
		if molOf(n.step.Before, n.phase) > 0 && n.tank == "" {
			more = "more "
		}
		f.Message = fmt.Sprintf("%s%s comes down %s: %s (%s)", more, f.Phase, doing(n.step), mass(f.AmountG), perLitre(f.AmountGPerL))
		p.byAmount(&f)
		p.asDelivered(n, &f)
		p.Report(n.step, f)
	}
}

// asDelivered makes a note of what a water alone is oversaturated with: it came
// clear through the main, so it will not cloud the tank.
func (p *Pass) asDelivered(n newSolid, f *Finding) {
	c := n.step.Charged
	if c == nil || c.Water == nil || f.Index > 1 || n.tank != "" {
		return
	}
	if b := n.step.Before; b != nil {
		for name := range b.From {
			if m := p.Trace.Materials[name]; m == nil || m.Water == nil {
				return
			}
		}
	}
	f.Level = recipe.Note
	f.Message = fmt.Sprintf("water %q is oversaturated with %s as it comes (%s); it will scale rather than cloud", c.Name, f.Phase, perLitre(f.AmountGPerL))
}

func runMild(p *Pass) {
	for _, n := range p.newSolids() {
		if p.Trace.System.Phases[n.phase].Forms == equilibrium.FormsSlow || !p.mild(n) {
			continue
		}
		f := p.ofSolid(n.phase, n.mol, n.liquor)
		f.Tank = n.tank
		f.Message = fmt.Sprintf("the liquor is oversaturated with %s %s and may stay clear for a while; in balance %s (%s) of it would come down", f.Phase, doing(n.step), mass(f.AmountG), perLitre(f.AmountGPerL))
		p.byAmount(&f)
		p.asDelivered(n, &f)
		p.Report(n.step, f)
	}
}

// runPlanned checks every expected solid at the end of its stage.
func runPlanned(p *Pass) {
	sys := p.Trace.System
	for _, stage := range p.Trace.Recipe.Stages {
		for _, e := range stage.Steps {
			if e.Kind != recipe.Expect {
				continue
			}
			p.expected(stage, e, sys)
		}
	}
}

func (p *Pass) expected(stage *recipe.Stage, e *recipe.Step, sys *equilibrium.System) {
	best, phase := 0.0, -1
	var where, last *trace.Step
	for _, s := range p.Trace.Steps {
		if s.Stage != stage || s.After == nil || s.Tank != e.Tank {
			continue
		}
		last = s
		for _, solid := range s.After.Solids {
			if p.isPhase(e.What, solid.Phase) && solid.Mol > best {
				best, phase, where = solid.Mol, solid.Phase, s
			}
		}
	}
	if last == nil {
		return
	}
	f := blank()
	f.Tank, f.At = e.Tank.Name, e.At
	if phase < 0 {
		for i := range sys.Phases {
			if p.isPhase(e.What, i) && (phase < 0 || last.After.State.Index[i] > last.After.State.Index[phase]) {
				phase = i
			}
		}
		f.Phase = e.What
		f.Message = fmt.Sprintf("%s is expected and does not form", e.What)
		if phase < 0 {
			f.Message += ": the liquor lacks what it is made of"
			p.Report(last, f)
			return
		}
		ph := sys.Phases[phase]
		f.Phase, f.Formula, f.Index = ph.Name, ph.Formula, last.After.State.Index[phase]
		f.Uncertainty = sys.IndexUncertainty(last.After.State, phase)
		if math.IsInf(f.Index, -1) {
			f.Message += ": the liquor lacks part of what it is made of"
			f.Index, f.Uncertainty = math.NaN(), math.NaN()
		} else {
			f.Probability = normal(-f.Index / f.Uncertainty)
			f.Message += fmt.Sprintf(": its saturation index is %.2f at pH %.1f and %.0f °C", f.Index, last.After.State.PH, last.After.TempK-equilibrium.ZeroCelsius)
		}
		f.Evidence = p.evidence(phase, last.After.State)
		p.Report(last, f)
		return
	}
	if e.AtLeast == nil {
		return
	}
	ph := sys.Phases[phase]
	kg := best * ph.MolarMass / 1000
	whole, holds := p.couldForm(phase, where.After)
	switch e.AtLeast.Dimension {
	case recipe.Mass:
		if kg >= e.AtLeast.Value {
			return
		}
		f.Message = fmt.Sprintf("%s falls short: %s forms, %s or more is expected", ph.Name, mass(kg*1000), mass(e.AtLeast.Value*1000))
	default:
		if best >= e.AtLeast.Value*whole {
			return
		}
		f.Message = fmt.Sprintf("%s falls short: %s of what could form, %s or more is expected", ph.Name, percent(best/whole), percent(e.AtLeast.Value))
	}
	f.Phase, f.Formula, f.AmountG = ph.Name, ph.Formula, kg*1000
	f.AmountGPerL = f.AmountG / where.After.VolumeL
	f.Limits = append(holds, fmt.Sprintf("pH %.1f, %.0f °C", where.After.State.PH, where.After.TempK-equilibrium.ZeroCelsius))
	f.Evidence = p.evidence(phase, where.After.State)
	p.Report(where, f)
}

// couldForm is how much of a phase the scarcest of its components allows, and
// what is left of each in solution.
func (p *Pass) couldForm(phase int, l *trace.Liquor) (float64, []string) {
	sys := p.Trace.System
	least := math.Inf(1)
	var left []string
	for _, part := range sys.Phases[phase].Parts {
		if part.Component == "H2O" || part.Component == "H^+" || part.Coefficient <= 0 {
			continue
		}
		i := sys.Index(part.Component)
		least = math.Min(least, l.Totals[i]/part.Coefficient)
		left = append(left, fmt.Sprintf("%s left in solution: %s", Ion(part.Component), perLitre(dissolvedGPerL(sys, l, part.Component))))
	}
	return least, left
}

// dissolvedGPerL is the total of a component in solution.
func dissolvedGPerL(sys *equilibrium.System, l *trace.Liquor, component string) float64 {
	mol := 0.0
	for i, sp := range sys.Species {
		for _, part := range sp.Parts {
			if part.Component == component {
				mol += part.Coefficient * l.State.Molality[i] * l.State.WaterKg
			}
		}
	}
	c, _ := sys.Database.Component(component)
	return mol * c.MolarMass / l.SolutionL
}

func runCarried(p *Pass) {
	for _, s := range p.Trace.Steps {
		if s.Into == nil || len(s.Carried) == 0 || s.IntoAfter == nil {
			continue
		}
		for _, c := range s.Carried {
			if p.planned(c.Phase, s) {
				continue
			}
			ph := p.Trace.System.Phases[c.Phase]
			f := blank()
			f.Phase, f.Formula, f.AmountG = ph.Name, ph.Formula, c.Kg*1000
			if s.Source != nil && s.Source.Volume != nil {
				f.AmountGPerL = f.AmountG / s.Source.Volume.Value
			} else {
				f.AmountGPerL = f.AmountG / math.Max(s.IntoAfter.VolumeL, 1e-9)
			}
			f.Message = fmt.Sprintf("%s of %s goes over into tank %q", mass(f.AmountG), ph.Name, s.Into.Name)
			if molOf(s.IntoAfter, c.Phase) < 0.1*c.Mol {
				f.Message += " and dissolves there"
				f.Level = recipe.Note
			}
			p.byAmount(&f)
			p.Report(s, f)
		}
	}
}

// neverInABatch are solids that waters are oversaturated with for years.
var neverInABatch = []string{"dolomite", "quartz", "chalcedony", "magnesite", "huntite", "hematite", "haematite", "talc", "chrysotile", "sepiolite", "kaolinite", "albite", "cristobalite", "tridymite", "diaspore", "boehmite", "corundum"}

func tooSlow(name string) bool {
	for _, n := range neverInABatch {
		if strings.Contains(strings.ToLower(name), n) {
			return true
		}
	}
	return false
}

func runAged(p *Pass) {
	seen := map[string]bool{}
	for _, s := range p.Trace.Steps {
		if s.Source == nil || s.After == nil {
			continue
		}
		aged, level := s.Aged, recipe.Note
		switch {
		case s.Source.Kind == recipe.Age:
			aged, level = s.After, recipe.Caution
		case s.Source.Kind != recipe.Hold || s.Source.For == nil || s.Source.For.Value < 3600:
			continue
		}
		if aged == nil {
			continue
		}
		solids := append([]trace.PhaseAmount{}, aged.Solids...)
		sort.SliceStable(solids, func(i, j int) bool { return solids[i].Kg > solids[j].Kg })
		for _, solid := range solids {
			ph := p.Trace.System.Phases[solid.Phase]
			key := s.Tank.Name + "|" + ph.Name
			if ph.Forms != equilibrium.FormsSlow || tooSlow(ph.Name) || seen[key] || molOf(s.Before, solid.Phase) > 0 || p.planned(solid.Phase, s) || ofCharge(s, solid.Phase) {
				continue
			}
			seen[key] = true
			f := p.ofSolid(solid.Phase, solid.Mol, s.After)
			f.Index = s.After.Clear.Index[solid.Phase]
			if s.Source.Kind == recipe.Age {
				f.Message = fmt.Sprintf("%s may form on ageing: up to %s (%s)", ph.Name, mass(f.AmountG), perLitre(f.AmountGPerL))
			} else {
				f.Message = fmt.Sprintf("%s, which forms slowly, may appear if the batch stands: up to %s (%s)", ph.Name, mass(f.AmountG), perLitre(f.AmountGPerL))
			}
			f.Level = level
			p.byAmount(&f)
			p.Report(s, f)
		}
	}
}

// runHydrate tells solids of one salt that take each other's place.
func runHydrate(p *Pass) {
	for _, s := range p.Trace.Steps {
		if s.After == nil {
			continue
		}
		for _, now := range s.After.Solids {
			if s.Before == nil || molOf(s.Before, now.Phase) > 0 {
				continue
			}
			for _, old := range s.Before.Solids {
				if p.sameSalt(old.Phase, now.Phase) && molOf(s.After, old.Phase) < old.Mol*0.9 {
					p.changed(s, s.After, old.Phase, now, "in this step")
				}
			}
			if s.Charged != nil && ofChargeSalt(p, s, now.Phase) {
				p.changed(s, s.After, s.Charged.SolidPhases[0], now, "as it is charged")
			}
		}
		if s.Cold == nil {
			continue
		}
		for _, now := range s.Cold.Solids {
			if molOf(s.After, now.Phase) > 0 {
				continue
			}
			for _, old := range s.After.Solids {
				if p.sameSalt(old.Phase, now.Phase) {
					p.changed(s, s.Cold, old.Phase, now, "when it gets as cold as its lines")
				}
			}
		}
	}
}

func ofChargeSalt(p *Pass, s *trace.Step, phase int) bool {
	for _, c := range s.Charged.SolidPhases {
		if p.sameSalt(c, phase) && molOf(s.After, c) == 0 && molOf(s.Before, c) == 0 {
			return true
		}
	}
	return false
}

func (p *Pass) changed(s *trace.Step, l *trace.Liquor, old int, now trace.PhaseAmount, when string) {
	f := p.ofSolid(now.Phase, now.Mol, l)
	from := p.Trace.System.Phases[old]
	f.Message = fmt.Sprintf("%s turns into %s %s: %s of it; it may swell, set or change how it filters", from.Name, f.Phase, when, mass(f.AmountG))
	p.byAmount(&f)
	p.Report(s, f)
}
