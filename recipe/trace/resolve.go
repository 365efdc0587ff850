package trace

import (
	"fmt"
	"math"
	"slices"
	"strings"

	"dregs/equilibrium"
	"dregs/recipe"
)

// draft is a material of which only the components are known; the amounts follow
// when the System is there.
type draft struct {
	*Charged
	at       recipe.Range
	mix      *mixture
	perMol   []equilibrium.Part // of a pure substance
	molarKg  float64
	strength float64  // kg of it per kg
	phases   []string // that it is as a solid
	liquor   *recipe.LiquorFrom
	source   *Trace // of the liquor
	needs    []string
}

// resolve finds out what every material of the recipe is, makes the System of
// all their components, and then the moles per kg of each.
func (w *walker) resolve() bool {
	var drafts []*draft
	take := func(name string, at recipe.Range) {
		if name == "" || w.tr.Materials[name] != nil {
			return
		}
		d := w.draft(name, at)
		w.tr.Materials[name] = d.Charged
		drafts = append(drafts, d)
	}
	w.eachStep(func(s *recipe.Step) {
		switch s.Kind {
		case recipe.Charge, recipe.Dose, recipe.Seed, recipe.MakeUp:
			take(s.What, s.WhatAt)
		case recipe.Adjust:
			take(s.With, s.WithAt)
		case recipe.Filter:
			take(s.WashWith, s.WithAt)
		}
	})
	var components []string
	for _, d := range drafts {
		components = append(components, d.needs...)
	}
	components = append(components, w.fromGas()...)
	slices.Sort(components)
	sys, err := w.db.NewSystem(slices.Compact(components))
	if err != nil {
		w.problem(codeUnknown, true, w.recipe.At, "", "the chemistry of the recipe cannot be set up: %v", err)
		return false
	}
	w.sys, w.tr.System, w.solver = sys, sys, sys.NewSolver()
	w.molar = make([]float64, len(sys.Components))
	for i, c := range sys.Components {
		w.molar[i] = c.MolarMass / 1000
	}
	w.allow = make([]bool, len(sys.Phases))
	w.lost = make([]float64, len(sys.Components))
	w.gasPaths()
	for _, d := range drafts {
		if !d.unavailable {
			w.complete(d)
		}
	}
	return true
}

func (w *walker) eachStep(do func(*recipe.Step)) {
	var visit func(s *recipe.Step)
	visit = func(s *recipe.Step) {
		do(s)
		for _, d := range s.Doses {
			visit(d)
		}
	}
	for _, t := range w.recipe.Tanks {
		if t.Heel != nil {
			visit(t.Heel)
		}
	}
	for _, stage := range w.recipe.Stages {
		for _, s := range stage.Steps {
			visit(s)
		}
	}
}

// fromGas are the components that gases may bring: carbonate wherever a tank is
// not closed, and what is sparged or given as a partial pressure.
func (w *walker) fromGas() []string {
	wanted := map[string]bool{}
	for _, t := range w.recipe.Tanks {
		switch t.Headspace.Kind {
		case "", "air":
			wanted["CO2"] = true
		}
		for gas := range t.Headspace.PartialPa {
			wanted[gas] = true
		}
	}
	w.eachStep(func(s *recipe.Step) {
		if s.Kind == recipe.Sparge {
			a, _ := w.sparged(s)
			for gas := range a.fixed {
				wanted[gas] = true
			}
		}
	})
	var out []string
	for _, g := range w.db.Gases {
		if !wanted[g.Name] {
			continue
		}
		if species, ok := w.db.LookupSpecies(g.Species); ok {
			for _, p := range species.Parts {
				out = append(out, p.Component)
			}
		}
	}
	return out
}

// draft looks a name up: waters, materials and liquors of the recipe, pure water,
// the catalogue, minerals, formulas.
func (w *walker) draft(name string, at recipe.Range) *draft {
	d := &draft{Charged: &Charged{Name: name, DensityKgL: math.NaN(), TempK: roomK, HeatKJPerKg: math.NaN()}, at: at, strength: 1}
	for _, water := range w.recipe.Waters {
		if water.Name == name {
			w.draftWater(d, water)
			return d
		}
	}
	for _, material := range w.recipe.Materials {
		if material.Name == name {
			w.draftMaterial(d, material)
			return d
		}
	}
	for _, liquor := range w.recipe.Liquors {
		if liquor.Name == name {
			w.draftLiquor(d, liquor)
			return d
		}
	}
	switch strings.ToLower(name) {
	case "water", "demineralised water", "demineralized water", "deionised water", "deionized water", "distilled water", "pure water", "h2o":
		d.mix = &mixture{at: at}
		return d
	}
	w.draftSubstance(d, name)
	return d
}

func (w *walker) draftWater(d *draft, water *recipe.Water) {
	d.Water = water
	if water.Temperature != nil {
		d.TempK = water.Temperature.Value
	} else {
		w.missing(d.Name, "the temperature of the water is not given; 20 °C is taken", water.At)
	}
	d.mix = w.readContents(d.Name, water.Contents, water.At)
	d.mix.water, d.mix.ions = water, true
	d.needs = d.mix.components()
}

func (w *walker) draftMaterial(d *draft, m *recipe.Material) {
	d.Material = m
	switch {
	case m.Inert:
		d.InertPerKg = 1
	case len(m.Contents) > 0:
		d.mix = w.readContents(d.Name, m.Contents, m.At)
		d.needs = d.mix.components()
		for _, c := range m.Contents {
			if s, ok := lookup(c.What); ok {
				d.Hazards = append(d.Hazards, s.Hazards...)
			}
		}
	case m.Formula != "":
		d.at = m.FormulaAt
		w.draftSubstance(d, m.Formula)
		d.strength = 1 // the block says what it is
	default:
		w.draftSubstance(d, m.Name)
	}
	if m.Assay != nil && d.mix == nil {
		d.strength = m.Assay.Value
		if rest := 1 - d.strength; rest > 0.02 && m.Form != "solution" && len(d.phases) > 0 {
			w.missing(d.Name, fmt.Sprintf("the assay leaves %.3g %% open; it is taken as water", 100*rest), m.Assay.At)
		}
	}
	if m.Density != nil {
		d.DensityKgL = m.Density.Value
	} else if m.Formula != "" || m.Assay != nil {
		d.DensityKgL = math.NaN() // the catalogue's is of another strength
	}
	if m.Temperature != nil {
		d.TempK = m.Temperature.Value
	}
	if m.Form == "solution" {
		d.phases = nil
	}
}

// draftSubstance is one substance of the catalogue, a mineral, or a formula.
func (w *walker) draftSubstance(d *draft, name string) {
	formula := name
	if s, ok := lookup(name); ok {
		d.Substance, d.Hazards, formula = s, s.Hazards, s.Formula
		d.DensityKgL, d.molarKg = s.DensityKgL, s.MolarMass/1000
		if s.StrengthWt > 0 {
			d.strength = s.StrengthWt
		}
		if s.Inert || s.NoData != "" || len(s.Parts) == 0 {
			d.InertPerKg = 1
			if !s.Inert {
				w.blind(d.Name, "no data: "+s.NoData+"; it is taken as inert and takes no part in the computation", d.at)
			}
			return
		}
		d.perMol = s.Parts
		if sum := w.massOfParts(s.Parts); sum > 0 {
			d.molarKg = sum // to the last digit what is put in, so that mass is kept
		}
		d.HeatKJPerKg = s.HeatKJPerMol / d.molarKg
	} else if p, ok := w.db.LookupPhase(name); ok {
		d.perMol, d.molarKg, formula = p.Parts, p.MolarMass/1000, p.Formula
		d.DensityKgL = p.DensityKgL
	} else {
		parts, err := decompose(w.db, name)
		if err != nil {
			w.problem(codeUnknown, true, d.at, "a substance of the catalogue, a formula of its components, or a material block with contents or inert = true", "nothing is known of %q: %v", name, err)
			d.unavailable = true
			return
		}
		d.perMol, d.molarKg = parts, w.massOfParts(parts)
	}
	for _, p := range d.perMol {
		d.needs = append(d.needs, p.Component)
	}
	solid := d.Substance == nil || d.strength >= 1 && d.Substance.Form != "liquid" && d.Substance.Form != "solution" && d.Substance.Form != "gas"
	if solid {
		d.phases = w.solidNames(d.Name, name, formula)
	}
}

// solidNames are the phases that a solid charge is: the one that bears its name,
// else those of its formula that form fast, else the one that forms most readily.
func (w *walker) solidNames(charge, name, formula string) []string {
	list := w.db.PhasesOf(formula)
	for _, p := range list {
		for _, known := range append([]string{p.Name}, p.Synonyms...) {
			if strings.EqualFold(known, name) || strings.EqualFold(known, charge) {
				return []string{p.Name}
			}
		}
	}
	var out []string
	for _, p := range list {
		if p.Forms == equilibrium.FormsFast {
			out = append(out, p.Name)
		}
	}
	if len(out) == 0 && len(list) > 0 {
		out = []string{list[0].Name}
	}
	return out
}

// draftLiquor walks the recipe that the liquor comes from.
func (w *walker) draftLiquor(d *draft, l *recipe.LiquorFrom) {
	d.liquor = l
	if l.Recipe == nil || w.depth >= deepest {
		w.problem(codeUnknown, true, l.At, "a recipe that can be read, not in a circle", "liquor %q cannot be computed: its recipe %q is not there", l.Name, l.From)
		d.unavailable = true
		return
	}
	d.source = walk(l.Recipe, Options{Database: w.db}, w.depth+1).tr
	end := d.source.final(l.Tank)
	if end == nil || !end.wet() {
		w.problem(codeUnknown, true, l.At, "a tank that holds liquor at the end", "liquor %q: tank %q of %q holds none at the end", l.Name, l.Tank, l.From)
		d.unavailable = true
		return
	}
	for i, n := range end.Totals {
		if n != 0 {
			d.needs = append(d.needs, d.source.System.Components[i].Name)
		}
	}
	for _, s := range end.Solids {
		d.phases = append(d.phases, d.source.System.Phases[s.Phase].Name)
	}
}

// final is the last content of a tank.
func (t *Trace) final(tank string) *Liquor {
	for i := len(t.Steps) - 1; i >= 0; i-- {
		s := t.Steps[i]
		if s.Into != nil && s.Into.Name == tank && s.IntoAfter != nil {
			return s.IntoAfter
		}
		if s.Tank != nil && s.Tank.Name == tank {
			return s.After
		}
	}
	return nil
}

// complete fills in the moles per kg.
func (w *walker) complete(d *draft) {
	c := d.Charged
	for _, name := range d.phases {
		if i := w.sys.PhaseIndex(name); i >= 0 {
			c.SolidPhases = append(c.SolidPhases, i)
		}
	}
	switch {
	case c.InertPerKg == 1:
		c.heatPerKgK = inertHeat
		if !(c.DensityKgL > 0) {
			c.DensityKgL = inertDensityKgL
		}
	case d.mix != nil:
		w.compose(c, d.mix)
	case d.source != nil:
		end := d.source.final(d.liquor.Tank)
		perKg := make([]float64, len(w.sys.Components))
		for i, n := range end.Totals {
			if n != 0 {
				perKg[w.sys.Index(d.source.System.Components[i].Name)] += n / end.MassKg
			}
		}
		c.Parts, c.InertPerKg = w.partsOf(perKg), end.InertKg/end.MassKg
		c.TempK, c.liquid = end.TempK, true
		c.DensityKgL = end.MassKg / end.VolumeL
		c.heatPerKgK = (d.source.System.HeatCapacityKJPerK(end.State) + inertHeat*end.InertKg) / end.MassKg
	default:
		w.completeSubstance(d)
	}
}

func (w *walker) completeSubstance(d *draft) {
	c := d.Charged
	perKg := make([]float64, len(w.sys.Components))
	c.molPerKg = d.strength / d.molarKg
	for _, p := range d.perMol {
		perKg[w.sys.Index(p.Component)] += p.Coefficient * c.molPerKg
	}
	if rest := 1 - d.strength; rest > 0 {
		h2o := w.sys.Index("H2O")
		perKg[h2o] += rest / w.molar[h2o]
	}
	c.Parts = w.partsOf(perKg)
	c.HeatKJPerKg *= d.strength
	form := ""
	if d.Substance != nil {
		form = d.Substance.Form
	}
	if d.Material != nil && d.Material.Form != "" {
		form = d.Material.Form
	}
	c.liquid = form == "solution" || form == "liquid" || d.strength < 0.9
	c.heatPerKgK = solidHeat
	if c.liquid {
		c.heatPerKgK = waterHeat*(1-d.strength) + solidHeat*d.strength
		if d.strength < 0.5 {
			c.heatPerKgK = waterHeat * (1 - d.strength)
		}
	}
	if c.liquid && !(c.DensityKgL > 0) {
		if st := w.alone(perKg, c.TempK, nil); st != nil {
			c.DensityKgL = w.sys.SolutionMassKg(st) / w.sys.VolumeL(st)
		}
	}
}
