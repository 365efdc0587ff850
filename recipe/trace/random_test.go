package trace

import (
	"math"
	"math/rand/v2"
	"testing"

	"dregs/recipe"
)

// Random batches of two tanks: mass is kept, nothing panics, every volume is a
// number, and every step starts where the last one in its tank ended.
func TestRandomBatchesKeepMass(t *testing.T) {
	names := []string{"water", "CaCl2", "Na2SO4", "NaCl", "Na2CO3", "CaCO3", "MgSO4.7H2O", "Na3PO4", "NaOH", "HCl", "gum"}
	rounds := 150
	if testing.Short() {
		rounds = 30
	}
	unsolved, steps := 0, 0
	for seed := uint64(1); seed <= uint64(rounds); seed++ {
		r := rand.New(rand.NewPCG(seed, 5))
		a, b := tank("T-1", []string{"air", "closed"}[r.IntN(2)]), tank("T-2", "air")
		a.Coldest = celsius(5)
		list := []*recipe.Step{charge("water", kg(100))}
		for range 12 {
			s := &recipe.Step{Tank: []*recipe.Tank{a, a, b}[r.IntN(3)]}
			other := a
			if s.Tank == a {
				other = b
			}
			name, amount := names[r.IntN(len(names))], kg(math.Pow(10, -4+5*r.Float64()))
			switch r.IntN(10) {
			case 0, 1, 2, 3:
				s.Kind, s.What, s.Amount = recipe.Charge, name, amount
			case 4:
				s.Kind, s.What, s.Amount, s.Over = recipe.Dose, name, amount, minutes(5)
			case 5:
				s.Kind, s.To = recipe.Heat, celsius(100*r.Float64())
			case 6:
				s.Kind, s.Volume, s.Into, s.Clear, s.Over = recipe.Transfer, litres(100*r.Float64()), other, r.IntN(2) == 0, minutes(5)
			case 7:
				s.Kind, s.Into, s.Moisture, s.WashWith, s.Wash = recipe.Filter, other, q(0.5*r.Float64(), recipe.MassFraction), "water", kg(1)
			case 8:
				s.Kind, s.PH, s.With, s.AtMost = recipe.Adjust, q(2+10*r.Float64(), recipe.Number), []string{"HCl", "NaOH"}[r.IntN(2)], kg(1)
			case 9:
				s.Kind, s.What, s.To = recipe.MakeUp, "water", litres(150)
			}
			list = append(list, s)
		}
		p := plan([]*recipe.Tank{a, b}, list...)
		p.Materials = []*recipe.Material{{Name: "gum", Inert: true}}
		w := walk(p, Options{}, 0)
		for _, problem := range w.tr.Problems {
			if problem.Code == codeUnsolved {
				unsolved++
				t.Logf("seed %d: %s", seed, problem.Message)
			} else if problem.Fatal {
				t.Errorf("seed %d: %s", seed, problem.Message)
			}
		}
		steps += len(w.tr.Steps)
		if len(w.tr.Problems) > 0 {
			continue
		}
		charged, held := 0.0, w.massOfTotals(w.lost)
		at := map[*recipe.Tank]*Liquor{}
		for _, s := range w.tr.Steps {
			charged += s.ChargedKg
			for _, g := range s.GasOut {
				for _, part := range w.gas[g.Gas].parts {
					held += g.Mol * part.Coefficient * w.molar[w.sys.Index(part.Component)]
				}
			}
			if before := at[s.Tank]; before != nil && before != s.Before {
				t.Errorf("seed %d: %s does not start where the tank was left", seed, s.What)
			}
			at[s.Tank] = s.After
			if s.Into != nil {
				at[s.Into] = s.IntoAfter
			}
			if !(s.After.VolumeL >= 0) || !(s.After.MassKg >= -1e-9) {
				t.Errorf("seed %d: %s leaves %g L, %g kg", seed, s.What, s.After.VolumeL, s.After.MassKg)
			}
		}
		for _, l := range at {
			held += l.MassKg
		}
		if !near(charged, held, 1e-9) {
			t.Errorf("seed %d: %.9f kg charged, %.9f kg held and lost", seed, charged, held)
		}
	}
	t.Logf("%d steps, %d without an equilibrium", steps, unsolved)
	if unsolved > rounds/20 {
		t.Errorf("%d of %d batches found no equilibrium", unsolved, rounds)
	}
}
