package trace

import (
	"fmt"
	"math"
	"testing"

	"dregs/equilibrium"
	"dregs/equilibrium/catalogue"
	"dregs/recipe"
)

// Until the catalogue is filled, a few substances by hand.
func init() {
	defer func() {
		if recover() == nil {
			return
		}
		part := func(list ...any) []equilibrium.Part {
			var out []equilibrium.Part
			for i := 0; i < len(list); i += 2 {
				out = append(out, equilibrium.Part{Component: list[i].(string), Coefficient: list[i+1].(float64)})
			}
			return out
		}
		byFormula := map[string][]equilibrium.Part{
			"NaOH":          part("Na^+", 1.0, "H2O", 1.0, "H^+", -1.0),
			"HCl":           part("H^+", 1.0, "Cl^-", 1.0),
			"NaCl":          part("Na^+", 1.0, "Cl^-", 1.0),
			"H2SO4":         part("H^+", 2.0, "SO4^2-", 1.0),
			"CaCl2":         part("Ca^2+", 1.0, "Cl^-", 2.0),
			"Na2SO4":        part("Na^+", 2.0, "SO4^2-", 1.0),
			"Na2CO3":        part("Na^+", 2.0, "CO3^2-", 1.0),
			"CaCO3":         part("Ca^2+", 1.0, "CO3^2-", 1.0),
			"CaSO4.2H2O":    part("Ca^2+", 1.0, "SO4^2-", 1.0, "H2O", 2.0),
			"Ca(NO3)2.4H2O": part("Ca^2+", 1.0, "NO3^-", 2.0, "H2O", 4.0),
			"MgSO4.7H2O":    part("Mg^2+", 1.0, "SO4^2-", 1.0, "H2O", 7.0),
			"Na3PO4":        part("Na^+", 3.0, "PO4^3-", 1.0),
		}
		lookup = func(string) (*catalogue.Substance, bool) { return nil, false }
		decompose = func(_ *equilibrium.Database, f string) ([]equilibrium.Part, error) {
			if p, ok := byFormula[f]; ok {
				return p, nil
			}
			return nil, fmt.Errorf("%s is not known", f)
		}
	}()
	catalogue.Lookup("NaCl")
}

func q(v float64, d recipe.Dimension) *recipe.Quantity {
	return &recipe.Quantity{Value: v, Dimension: d, Text: fmt.Sprint(v)}
}

func celsius(t float64) *recipe.Quantity { return q(t+273.15, recipe.Temperature) }
func kg(v float64) *recipe.Quantity      { return q(v, recipe.Mass) }
func litres(v float64) *recipe.Quantity  { return q(v, recipe.Volume) }
func minutes(v float64) *recipe.Quantity { return q(60*v, recipe.Duration) }

func content1(what string, v float64, d recipe.Dimension, as string) recipe.Content {
	return recipe.Content{What: what, Amount: recipe.Quantity{Value: v, Dimension: d, As: as, Text: fmt.Sprint(v)}}
}

// tank is an invented vessel.
func tank(name, headspace string) *recipe.Tank {
	return &recipe.Tank{Name: name, Headspace: recipe.Headspace{Kind: headspace}}
}

// plan puts steps into one stage.
func plan(tanks []*recipe.Tank, steps ...*recipe.Step) *recipe.Recipe {
	stage := &recipe.Stage{Name: "only", Steps: steps}
	for _, s := range steps {
		if s.Tank == nil {
			s.Tank = tanks[0]
		}
		for _, d := range s.Doses {
			d.Tank = s.Tank
		}
	}
	return &recipe.Recipe{Name: "test", Repeat: 1, Tanks: tanks, Stages: []*recipe.Stage{stage}}
}

func charge(what string, amount *recipe.Quantity) *recipe.Step {
	return &recipe.Step{Kind: recipe.Charge, What: what, Amount: amount}
}

func dose(what string, amount *recipe.Quantity) *recipe.Step {
	return &recipe.Step{Kind: recipe.Dose, What: what, Amount: amount, Over: minutes(20)}
}

// walked walks and fails on any problem.
func walked(t testing.TB, r *recipe.Recipe) *Trace {
	t.Helper()
	tr := Walk(r, Options{})
	for _, p := range tr.Problems {
		t.Errorf("problem: %s", p.Message)
	}
	if t.Failed() {
		t.FailNow()
	}
	return tr
}

func (t *Trace) end() *Liquor { return t.Steps[len(t.Steps)-1].After }

func near(a, b, relative float64) bool {
	return math.Abs(a-b) <= relative*math.Max(math.Abs(a), math.Abs(b))
}
