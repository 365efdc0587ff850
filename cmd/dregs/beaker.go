package main

import (
	"fmt"
	"strings"

	"github.com/spf13/cobra"

	"dregs/equilibrium"
	"dregs/equilibrium/catalogue"
	"dregs/recipe"
	"dregs/recipe/trace"
)

func (c *call) beakerVerb() *cobra.Command {
	var at, headspace, as string
	verb := &cobra.Command{
		Use:   "beaker AMOUNT...",
		Short: "computes one mix without a file",
		Long: `beaker mixes the amounts in the order given and prints the mix at equilibrium at
the temperature of --at: pH, what dissolved of each solid, what stands in it,
what is close to coming down.

An AMOUNT is a mass, a volume or moles, and a name or formula: "3 g CaSO4.2H2O",
"250 mL hydrochloric acid 37 %", "0.1 mol NaCl". A name without a strength means
what is usual to buy, a formula the pure substance.`,
		Example: `  dregs beaker "1 kg water" "3 g CaSO4.2H2O" --at "25 degC"
  dregs beaker "1 L water" "2 g CaCO3" --at "12 degC" --headspace air
  dregs beaker "1 kg water" "10 mL hydrochloric acid 37 %" "5 g calcite" --at "20 degC" --as json`,
		RunE: func(_ *cobra.Command, amounts []string) error {
			if len(amounts) == 0 {
				return badCallf("beaker needs what to mix, such as \"1 kg water\" \"3 g CaSO4.2H2O\"")
			}
			return c.beaker(amounts, at, headspace, as)
		},
	}
	f := verb.Flags()
	f.StringVar(&at, "at", "25 degC", "`TEMPERATURE` of the mix")
	f.StringVar(&headspace, "headspace", "closed", "what stands above: closed, air, nitrogen, or pressures such as \"CO2 = 40 Pa\"")
	f.StringVar(&as, "as", "text", "text, csv or json")
	return verb
}

// mix is what the beaker holds: a plan of one tank, and its walk.
type mix struct {
	trace *trace.Trace
	final *trace.Step
	air   string // headspace, as given
}

func (c *call) beaker(amounts []string, at, headspace, as string) error {
	if err := oneOf("--as", as, "text", "csv", "json"); err != nil {
		return err
	}
	plan, err := beakerPlan(amounts, at, headspace)
	if err != nil {
		return err
	}
	tr := trace.Walk(plan, trace.Options{})
	for _, p := range tr.Problems {
		fault := p.Message
		if p.Expected != "" {
			fault += "; expected " + p.Expected
		}
		c.faultf("%s", fault)
	}
	if len(tr.Problems) > 0 || len(tr.Steps) == 0 {
		return nil
	}
	m := &mix{trace: tr, final: tr.Steps[len(tr.Steps)-1], air: headspace}
	switch as {
	case "json":
		return c.beakerJSON(m)
	case "csv":
		return c.stepsCSV(tr.System, []*trace.Step{m.final})
	}
	c.beakerScreen(m)
	return nil
}

// beakerPlan makes a recipe of one tank: everything charged at the temperature,
// brought back to it after the heat of mixing, and left under the headspace.
func beakerPlan(amounts []string, at, headspace string) (*recipe.Recipe, error) {
	temperature, err := recipe.ParseQuantity(at, recipe.Temperature)
	if err != nil {
		return nil, badCallf("option --at: %v", err)
	}
	if c := temperature.Value - equilibrium.ZeroCelsius; c < -0.01 || c > 100.01 {
		return nil, badCallf("option --at: %s is outside what is computed, 0 to 100 °C", unitText(at))
	}
	above, err := parseHeadspace(headspace)
	if err != nil {
		return nil, err
	}
	tank := &recipe.Tank{Name: "beaker", Headspace: above}
	stage := &recipe.Stage{Name: "mix", Tank: tank}
	plan := &recipe.Recipe{Name: "beaker", File: "beaker", Repeat: 1, Tanks: []*recipe.Tank{tank}, Stages: []*recipe.Stage{stage}}
	add := func(s *recipe.Step) {
		s.Tank, s.Stage = tank, stage
		s.At = recipe.Range{File: "beaker", Line: len(stage.Steps) + 1, Column: 1, Byte: len(stage.Steps)}
		stage.Steps = append(stage.Steps, s)
	}
	for _, text := range amounts {
		quantity, name, err := splitAmount(text)
		if err != nil {
			return nil, err
		}
		name, material, err := nameOrStrength(name)
		if err != nil {
			return nil, err
		}
		if material != nil {
			plan.Materials = append(plan.Materials, material)
		}
		add(&recipe.Step{Kind: recipe.Charge, What: name, Amount: &quantity, Temperature: &temperature})
	}
	add(&recipe.Step{Kind: recipe.Heat, To: &temperature})
	switch above.Kind {
	case "air", "nitrogen":
		add(&recipe.Step{Kind: recipe.Sparge, Gas: above.Kind})
	}
	return plan, nil
}

// splitAmount parts "250 mL hydrochloric acid 37 %" into amount and name.
func splitAmount(text string) (recipe.Quantity, string, error) {
	words := strings.Fields(text)
	var first error
	for i := 1; i < len(words); i++ {
		if words[i] == "+-" || words[i] == "±" {
			i += 2
			continue
		}
		q, err := recipe.ParseQuantity(strings.Join(words[:i], " "), recipe.Mass, recipe.Volume, recipe.Amount)
		if err == nil {
			return q, strings.Join(words[i:], " "), nil
		}
		if i == min(2, len(words)-1) {
			first = err
		}
	}
	if first == nil {
		return recipe.Quantity{}, "", badCallf("%q is no amount of something, expected a mass, a volume or moles and a name, such as \"3 g CaSO4.2H2O\"", text)
	}
	return recipe.Quantity{}, "", badCallf("%q: %v; expected a mass, a volume or moles and a name, such as \"3 g CaSO4.2H2O\"", text, first)
}

// nameOrStrength finds what a name means. A strength that is not the usual one
// ("sulfuric acid 20 %") makes a material of its own, the rest of it water.
func nameOrStrength(name string) (string, *recipe.Material, error) {
	if knownSubstance(name) {
		return name, nil, nil
	}
	words := strings.Fields(strings.ReplaceAll(strings.ReplaceAll(name, "wt%", " %"), "%", " % "))
	if n := len(words); n >= 3 && words[n-1] == "%" {
		plain := strings.Join(words[:n-2], " ")
		strength, err := recipe.ParseQuantity(words[n-2]+" wt%", recipe.MassFraction)
		if s, ok := catalogue.Lookup(plain); ok && err == nil && s.Formula != "" {
			return name, &recipe.Material{Name: name, Formula: s.Formula, Assay: &strength, Form: "solution"}, nil
		}
		name = plain
	}
	if knownSubstance(name) {
		return "", nil, badCallf("%q: a strength in %% is for substances of one formula", name)
	}
	near := recipe.Nearest(name, substanceNames())
	_, why := catalogue.Decompose(database(), name)
	text := fmt.Sprintf("nothing is known of %q", name)
	if why != nil && strings.ContainsAny(name, "ABCDEFGHIJKLMNOPQRSTUVWXYZ") {
		text += fmt.Sprintf(" (%v)", why)
	}
	if near != "" {
		text += fmt.Sprintf("; the nearest is %q", near)
	}
	return "", nil, badCallf("%s", text)
}

// parseHeadspace reads closed, air, nitrogen or "CO2 = 40 Pa, NH3 = 1 Pa".
func parseHeadspace(text string) (recipe.Headspace, error) {
	switch text {
	case "closed", "air", "nitrogen":
		return recipe.Headspace{Kind: text}, nil
	}
	if !strings.Contains(text, "=") {
		return recipe.Headspace{}, oneOf("--headspace", text, "closed", "air", "nitrogen", "\"CO2 = 40 Pa\"")
	}
	above := recipe.Headspace{Kind: "given", PartialPa: map[string]float64{}}
	for _, part := range strings.Split(text, ",") {
		gas, pressure, _ := strings.Cut(part, "=")
		gas = strings.TrimSpace(gas)
		q, err := recipe.ParseQuantity(strings.TrimSpace(pressure), recipe.Pressure)
		if err != nil {
			return above, badCallf("option --headspace, %s: %v", gas, err)
		}
		if q.Value < 0 {
			return above, badCallf("option --headspace, %s: a pressure of zero or more is expected", gas)
		}
		var gases []string
		known := false
		for _, g := range database().Gases {
			gases = append(gases, g.Name)
			known = known || g.Name == gas
		}
		if !known {
			return above, badCallf("option --headspace: no data for the gas %q, expected one of %s", gas, strings.Join(gases, ", "))
		}
		above.PartialPa[gas] = q.Value
	}
	return above, nil
}
