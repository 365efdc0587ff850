package recipe

import (
	"strings"

	"github.com/hashicorp/hcl/v2/hclsyntax"
)

// stepAttributes names what each step takes besides tank; a star marks what it
// must have.
var stepAttributes = map[StepKind][]string{
	Charge: {"mass", "volume", "amount", "temperature"}, Dose: {"mass", "volume", "amount", "over", "temperature"},
	Seed: {"mass", "amount"}, Heat: {"to*", "over"}, Cool: {"to*", "over"}, Hold: {"for*"}, Age: {"for*"},
	Adjust: {"ph*", "with*", "at_most*", "at", "over"}, MakeUp: {"to*", "at", "temperature"}, Evaporate: {"water", "to", "over"},
	Sparge: {"pressure", "for"}, Transfer: {"to*", "volume", "all", "clear", "over"}, Decant: {"to", "volume", "all"},
	Filter: {"to", "moisture", "wash", "wash_with"}, Sample: nil, Together: {"over"}, Expect: {"at_least"},
}

// labelled steps name a material, a phase or a gas.
var labelled = map[StepKind]bool{Charge: true, Dose: true, Seed: true, MakeUp: true, Sparge: true, Expect: true}

var stepKinds = func() map[string]StepKind {
	m := map[string]StepKind{}
	for k, name := range StepKindName {
		if name != "" {
			m[name] = StepKind(k)
		}
	}
	return m
}()

func (r *reader) readStage(b *hclsyntax.Block) {
	name, at := r.label(b, true)
	s := &Stage{Name: name, At: at}
	for _, other := range r.recipe.Stages {
		if other.Name == name {
			r.problem("RCP-05", at, "", "", "stage %q is defined twice", name)
		}
	}
	r.onlyAttributes(b.Body, "a stage", []string{"tank", "about"})
	names := append([]string{"waive"}, StepKindName[1:]...)
	r.onlyBlocks(b.Body, "a stage", names)
	s.Tank = r.tankNamed(b.Body, "tank")
	if s.Tank == nil && b.Body.Attributes["tank"] == nil && len(r.recipe.Tanks) == 1 {
		s.Tank = r.recipe.Tanks[0]
		s.Tank.Used = true
	}
	for _, inner := range b.Body.Blocks {
		if inner.Type == "waive" {
			if w := r.waiver(inner); w != nil {
				s.Waivers = append(s.Waivers, w)
			}
			continue
		}
		if kind, ok := stepKinds[inner.Type]; ok {
			if step := r.readStep(inner, kind, s); step != nil {
				s.Steps = append(s.Steps, step)
			}
		}
	}
	if len(s.Steps) == 0 {
		r.problem("RCP-04", at, "charge, dose, heat ...", "", "stage %q has no step", name)
	}
	r.recipe.Stages = append(r.recipe.Stages, s)
}

func (r *reader) tankNamed(body *hclsyntax.Body, attribute string) *Tank {
	name, at, ok := r.text(body, attribute)
	if !ok {
		return nil
	}
	var names []string
	for _, t := range r.recipe.Tanks {
		if t.Name == name {
			t.Used = true
			return t
		}
		names = append(names, t.Name)
	}
	r.problem("RCP-02", at, "", Nearest(name, names), "there is no tank %q", name)
	return nil
}

// linkTanks is called when all tanks are known.
func (r *reader) linkTanks() {
	for _, t := range r.recipe.Tanks {
		if t.Heel != nil {
			t.Heel.Tank = t
		}
	}
}

func (r *reader) readStep(b *hclsyntax.Block, kind StepKind, stage *Stage) *Step {
	s := &Step{Kind: kind, Stage: stage, At: place(b.DefRange())}
	what, at := r.label(b, labelled[kind])
	s.What, s.WhatAt = what, at
	attributes := []string{"tank", "about"}
	for _, a := range stepAttributes[kind] {
		name := strings.TrimSuffix(a, "*")
		attributes = append(attributes, name)
		if a != name && b.Body.Attributes[name] == nil {
			r.problem("RCP-04", s.At, name+" = \"...\"", "", "%s needs the attribute %q", kind, name)
		}
	}
	if kind != Sample {
		r.onlyAttributes(b.Body, kind.String(), attributes)
	}
	blocks := []string{"waive"}
	if kind == Together {
		blocks = append(blocks, "dose")
	}
	r.onlyBlocks(b.Body, kind.String(), blocks)
	for _, w := range blocksOf(b.Body, "waive") {
		if waiver := r.waiver(w); waiver != nil {
			s.Waivers = append(s.Waivers, waiver)
		}
	}
	s.Tank = r.tankNamed(b.Body, "tank")
	if s.Tank == nil && b.Body.Attributes["tank"] == nil {
		s.Tank = stage.Tank
	}
	if s.Tank == nil {
		if b.Body.Attributes["tank"] == nil && stage.Tank == nil {
			r.problem("RCP-05", s.At, "tank = \"T-1\" in the stage or in the step", "", "%s has no tank", kind)
		}
		s.Tank = &Tank{Name: "?", Headspace: Headspace{Kind: "air"}, Used: true}
	}
	r.fillStep(b.Body, s)
	return s
}

// readCharge reads a heel, which is a charge before the first stage.
func (r *reader) readCharge(b *hclsyntax.Block, kind StepKind, where string) *Step {
	s := &Step{Kind: kind, At: place(b.DefRange())}
	s.What, s.WhatAt = r.label(b, true)
	r.onlyAttributes(b.Body, where, []string{"mass", "volume", "amount", "temperature"})
	r.onlyBlocks(b.Body, where, nil)
	r.amount(b.Body, s)
	s.Temperature = r.temperature(b.Body, "temperature")
	return s
}

// amount reads exactly one of mass, volume and amount.
func (r *reader) amount(body *hclsyntax.Body, s *Step) {
	found := 0
	for _, a := range []struct {
		name string
		want []Dimension
	}{{"mass", []Dimension{Mass, Volume}}, {"volume", []Dimension{Volume, Mass}}, {"amount", []Dimension{Amount, Mass, Volume}}} {
		attribute := body.Attributes[a.name]
		if attribute == nil {
			continue
		}
		found++
		q := r.quantity(body, a.name, a.want...)
		if q == nil {
			continue
		}
		wrong := a.name == "mass" && q.Dimension != Mass && !q.PerBatch || a.name == "volume" && q.Dimension != Volume && !q.PerBatch || a.name == "amount" && q.Dimension != Amount
		if wrong {
			r.problem("RCP-03", q.At, expected(a.want[:1]), "", "%s: %q measures %s", a.name, q.Text, kindName(q.Dimension))
			continue
		}
		s.Amount = q
	}
	switch {
	case found == 0:
		r.problem("RCP-04", s.At, "mass, volume or amount", "", "%s says no amount", s.Kind)
	case found > 1:
		r.problem("RCP-04", s.At, "one of mass, volume and amount", "", "%s says its amount more than once", s.Kind)
	}
}

func (r *reader) fillStep(body *hclsyntax.Body, s *Step) {
	s.Over = r.quantity(body, "over", Duration)
	s.Temperature = r.temperature(body, "temperature")
	s.ReadAt = r.temperature(body, "at")
	switch s.Kind {
	case Charge, Dose, Seed:
		r.amount(body, s)
	case Heat, Cool:
		s.To = r.temperature(body, "to")
	case Hold, Age:
		s.For = r.quantity(body, "for", Duration)
	case Adjust:
		s.PH = r.ph(body, "ph")
		if s.With, s.WithAt, _ = r.text(body, "with"); s.With != "" {
			s.WithAt = valueRange(body.Attributes["with"].Expr)
		}
		s.AtMost = r.quantity(body, "at_most", Mass, Volume)
	case MakeUp:
		s.To = r.quantity(body, "to", Volume, Mass)
	case Evaporate:
		s.Water, s.To = r.quantity(body, "water", Mass, Volume), r.quantity(body, "to", Volume, Mass)
		if (body.Attributes["water"] == nil) == (body.Attributes["to"] == nil) {
			r.problem("RCP-04", s.At, "one of water and to", "", "evaporate says how much water goes or to what volume")
		}
	case Sparge:
		s.Gas = s.What
		gases := []string{"air", "nitrogen", "CO2", "NH3", "H2S", "SO2"}
		if !contains(gases, s.Gas) && s.Gas != "" {
			r.problem("RCP-02", s.WhatAt, "one of "+strings.Join(gases, ", "), Nearest(s.Gas, gases), "there are no data of a gas %q", s.Gas)
		}
		s.Pressure, s.For = r.quantity(body, "pressure", Pressure), r.quantity(body, "for", Duration)
	case Transfer, Decant, Filter:
		r.fillTransfer(body, s)
	case Sample:
		r.fillSample(body, s)
	case Together:
		r.fillTogether(body, s)
	case Expect:
		s.AtLeast = r.quantity(body, "at_least", Mass, MassFraction)
	}
}

func (r *reader) fillTransfer(body *hclsyntax.Body, s *Step) {
	s.Into = r.tankNamed(body, "to")
	if s.Into != nil && s.Into == s.Tank {
		r.problem("RCP-05", s.At, "", "", "%s goes into the tank it comes from", s.Kind)
	}
	s.Volume, s.All, s.Clear = r.quantity(body, "volume", Volume), r.truth(body, "all"), r.truth(body, "clear")
	switch s.Kind {
	case Transfer:
		if (s.Volume == nil) == !s.All && body.Attributes["volume"] == nil {
			r.problem("RCP-04", s.At, "volume = \"200 L\" or all = true", "", "transfer does not say how much")
		} else if s.Volume != nil && s.All {
			r.problem("RCP-04", s.At, "volume or all", "", "transfer says how much twice")
		}
	case Filter:
		s.Moisture = r.quantity(body, "moisture", MassFraction)
		s.Wash = r.quantity(body, "wash", Volume, Mass)
		s.WashWith, _, _ = r.text(body, "wash_with")
		if s.Wash != nil && s.WashWith == "" {
			s.WashWith = "water"
		}
		if s.Moisture != nil && s.Moisture.Value >= 1 {
			r.problem("RCP-03", s.Moisture.At, "below 100 wt%", "", "a cake is not all liquor")
		}
	}
}

func (r *reader) fillTogether(body *hclsyntax.Body, s *Step) {
	for _, b := range blocksOf(body, "dose") {
		d := r.readStep(b, Dose, &Stage{Name: s.Stage.Name, Tank: s.Tank})
		d.Stage = s.Stage
		if d.Over == nil {
			d.Over = s.Over
		}
		s.Doses = append(s.Doses, d)
	}
	if len(s.Doses) < 2 {
		r.problem("RCP-04", s.At, "dose \"a\" { } and dose \"b\" { }", "", "together holds two doses or more")
	}
}

// fillSample reads limits: ph = ["5.5", "6.2"], F = { at_most = "5 mg/L" }.
func (r *reader) fillSample(body *hclsyntax.Body, s *Step) {
	for _, a := range sortedAttributes(body) {
		switch a.Name {
		case "tank", "about", "at":
			continue
		}
		want := []Dimension{MassPerVolume, MolPerVolume, MassFraction, Molality}
		switch a.Name {
		case "ph":
			want = []Dimension{Number}
		case "temperature":
			want = []Dimension{Temperature}
		case "density":
			want = []Dimension{Density}
		case "volume":
			want = []Dimension{Volume}
		case "solids":
			want = []Dimension{MassPerVolume, Mass}
		}
		limit := Limit{What: a.Name, At: place(a.NameRange)}
		switch e := a.Expr.(type) {
		case *hclsyntax.ObjectConsExpr:
			for _, item := range e.Items {
				key, known := literalKey(item.KeyExpr)
				if !known {
					continue
				}
				switch key {
				case "at_most":
					limit.High = r.quantityOf(item.ValueExpr, a.Name, want)
				case "at_least":
					limit.Low = r.quantityOf(item.ValueExpr, a.Name, want)
				default:
					r.problem("RCP-02", place(item.KeyExpr.Range()), "at_most or at_least", Nearest(key, []string{"at_most", "at_least"}), "a limit has no %q", key)
				}
			}
		default:
			limit.Low, limit.High = r.pair(a, a.Name, want)
		}
		s.Limits = append(s.Limits, limit)
	}
	if len(s.Limits) == 0 {
		r.problem("RCP-04", s.At, "ph = [\"5.5\", \"6.2\"]", "", "sample has no limit")
	}
}

func (r *reader) waiver(b *hclsyntax.Block) *Waiver {
	code, at := r.label(b, true)
	r.onlyAttributes(b.Body, "waive", []string{"phase", "because", "until", "reference"})
	r.onlyBlocks(b.Body, "waive", nil)
	w := &Waiver{Code: code, At: at}
	w.Phase, _, _ = r.text(b.Body, "phase")
	w.Because, _, _ = r.text(b.Body, "because")
	var untilAt Range
	w.Until, untilAt, _ = r.text(b.Body, "until")
	w.Reference, _, _ = r.text(b.Body, "reference")
	if strings.TrimSpace(w.Because) == "" {
		r.problem("RCP-07", at, "because = \"...\"", "", "a waiver needs its reason")
	}
	if r.o.KnownRule != nil && !r.o.KnownRule(code) {
		nearest := ""
		if r.o.Rules != nil {
			nearest = Nearest(code, r.o.Rules())
		}
		r.problem("RCP-02", at, "", nearest, "there is no rule %q", code)
	}
	if w.Phase != "" && r.o.KnownPhase != nil && !r.o.KnownPhase(w.Phase) && !r.ownPhase(w.Phase) {
		r.problem("RCP-02", at, "", Nearest(w.Phase, r.phaseNames()), "there is no phase %q", w.Phase)
	}
	if w.Until != "" {
		r.checkDate(w, untilAt)
	}
	return w
}
