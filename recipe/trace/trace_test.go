package trace

import (
	"math"
	"testing"

	"dregs/equilibrium"
	"dregs/recipe"
)

func TestGypsumStaysAndTellsHowToDissolveIt(t *testing.T) {
	r := plan([]*recipe.Tank{tank("T-1", "closed")}, charge("water", kg(1)), charge("CaSO4.2H2O", kg(0.003)))
	tr := walked(t, r)
	last := tr.Steps[len(tr.Steps)-1]
	if len(last.Undissolved) != 1 {
		t.Fatalf("undissolved %v, want gypsum", last.Undissolved)
	}
	u := last.Undissolved[0]
	if tr.System.Phases[u.Phase].Name != "gypsum" || u.Kg < 1e-4 || u.Kg > 1e-3 {
		t.Errorf("%s %g kg left", tr.System.Phases[u.Phase].Name, u.Kg)
	}
	t.Logf("left %.4g g, water %.4g kg, temp %.4g K", 1000*u.Kg, u.LeastWaterKg, u.LeastTempK)
	again := walked(t, plan([]*recipe.Tank{tank("T-1", "closed")}, charge("water", kg(1+1.001*u.LeastWaterKg)), charge("CaSO4.2H2O", kg(0.003))))
	if n := len(again.end().Solids); n != 0 {
		t.Errorf("%d solids left with the least water", n)
	}
	short := walked(t, plan([]*recipe.Tank{tank("T-1", "closed")}, charge("water", kg(1+0.98*u.LeastWaterKg)), charge("CaSO4.2H2O", kg(0.003))))
	if n := len(short.end().Solids); n != 1 {
		t.Errorf("%d solids left with less than the least water", n)
	}
}

// long is an invented batch through three tanks with most kinds of steps.
func long() *recipe.Recipe {
	a, b, c := tank("T-1", "air"), tank("T-2", "air"), tank("T-3", "closed")
	a.Coldest = celsius(5)
	town := &recipe.Water{Name: "town", Temperature: celsius(12), PH: q(7.6, recipe.Number), Contents: []recipe.Content{
		content1("Ca", 82e-6, recipe.MassPerVolume, ""), content1("Mg", 6e-6, recipe.MassPerVolume, ""), content1("Na", 21e-6, recipe.MassPerVolume, ""),
		content1("Cl", 30e-6, recipe.MassPerVolume, ""), content1("SO4", 45e-6, recipe.MassPerVolume, ""),
		content1("alkalinity", 210e-6, recipe.MassPerVolume, "CaCO3"), content1("SiO2", 12e-6, recipe.MassPerVolume, "")}}
	acid := &recipe.Material{Name: "acid", Contents: []recipe.Content{content1("HCl", 0.1, recipe.MassFraction, "")}}
	caustic := &recipe.Material{Name: "caustic", Contents: []recipe.Content{content1("NaOH", 0.1, recipe.MassFraction, "")}}
	r := plan([]*recipe.Tank{a, b, c},
		charge("town", litres(800)),
		&recipe.Step{Kind: recipe.Heat, To: celsius(40)},
		dose("CaCl2", kg(10)),
		dose("caustic", kg(5)),
		dose("Na2SO4", kg(12)),
		&recipe.Step{Kind: recipe.Hold, For: minutes(90)},
		&recipe.Step{Kind: recipe.Adjust, PH: q(5.8, recipe.Number), With: "acid", AtMost: kg(50), ReadAt: celsius(25)},
		&recipe.Step{Kind: recipe.Together, Over: minutes(60), Doses: []*recipe.Step{dose("CaCl2", kg(8)), dose("Na2CO3", kg(9))}},
		&recipe.Step{Kind: recipe.MakeUp, What: "town", To: litres(1000)},
		&recipe.Step{Kind: recipe.Transfer, Volume: litres(400), Into: b, Over: minutes(30)},
		&recipe.Step{Kind: recipe.Decant, Volume: litres(100), Into: c},
		&recipe.Step{Kind: recipe.Filter, Tank: b, Into: c, Moisture: q(0.3, recipe.MassFraction), WashWith: "water", Wash: kg(5)},
		&recipe.Step{Kind: recipe.Evaporate, Tank: c, Water: kg(30)},
		&recipe.Step{Kind: recipe.Sample, Tank: c, ReadAt: celsius(20)},
		&recipe.Step{Kind: recipe.Transfer, All: true, Into: b},
	)
	r.Waters, r.Materials = []*recipe.Water{town}, []*recipe.Material{acid, caustic}
	return r
}

func TestMassBalanceOverALongBatch(t *testing.T) {
	r := long()
	w := walkerOf(t, r)
	tr := w.tr
	in := make([]float64, len(tr.System.Components))
	add := func(c *Charged, kg float64) {
		for _, p := range c.Parts {
			in[tr.System.Index(p.Component)] += p.Coefficient * kg
		}
	}
	for _, s := range tr.Steps {
		if s.Charged != nil {
			add(s.Charged, s.ChargedKg)
		}
	}
	held := append([]float64{}, w.lost...)
	for _, tank := range r.Tanks {
		for i, n := range w.tanks[tank].Totals {
			held[i] += n
		}
	}
	for _, s := range tr.Steps {
		for _, g := range s.GasOut {
			for _, p := range w.gas[g.Gas].parts {
				held[tr.System.Index(p.Component)] += g.Mol * p.Coefficient
			}
		}
	}
	for i, c := range tr.System.Components {
		size := math.Max(math.Abs(in[i]), 1e-9)
		if c.Name == "H^+" { // a difference of large numbers: carbonate alone brings moles of it
			size += math.Abs(in[tr.System.Index("CO3^2-")])
		}
		if math.Abs(held[i]-in[i]) > 1e-9*size {
			t.Errorf("%s: %.12g mol held and lost, %.12g charged", c.Name, held[i], in[i])
		}
	}
	for _, s := range tr.Steps {
		t.Logf("%-28s %7.1f L %6.1f °C pH %6.3f solids %v gas %v", s.What, s.After.VolumeL, s.After.TempK-273.15, s.After.State.PH, names(tr, s.After), len(s.GasOut))
	}
}

func names(tr *Trace, l *Liquor) map[string]float64 {
	out := map[string]float64{}
	for _, s := range l.Solids {
		out[tr.System.Phases[s.Phase].Name] = s.Kg
	}
	return out
}

// walkerOf walks with the inside open to the test.
func walkerOf(t testing.TB, r *recipe.Recipe) *walker {
	t.Helper()
	w := walk(r, Options{}, 0)
	for _, p := range w.tr.Problems {
		t.Fatalf("problem: %s", p.Message)
	}
	return w
}

func TestOrderOfChargingDoesNotMatter(t *testing.T) {
	items := []*recipe.Step{charge("water", kg(100)), charge("CaCl2", kg(1)), charge("Na2SO4", kg(2)), charge("NaOH", kg(0.1))}
	orders := [][]int{{0, 1, 2, 3}, {3, 0, 2, 1}, {1, 2, 3, 0}}
	var first *Liquor
	for _, order := range orders {
		var steps []*recipe.Step
		for _, i := range order {
			s := *items[i]
			s.Tank = nil
			steps = append(steps, &s)
		}
		steps = append(steps, &recipe.Step{Kind: recipe.Heat, To: celsius(30)})
		tr := walked(t, plan([]*recipe.Tank{tank("T-1", "closed")}, steps...))
		end := tr.end()
		if first == nil {
			first = end
			if len(end.Solids) == 0 {
				t.Error("no gypsum: the test tests nothing")
			}
			continue
		}
		if math.Abs(end.State.PH-first.State.PH) > 1e-6 || !near(end.VolumeL, first.VolumeL, 1e-9) || !near(end.MassKg, first.MassKg, 1e-12) {
			t.Errorf("order %v: pH %.9f, %.9f L; first %.9f, %.9f L", order, end.State.PH, end.VolumeL, first.State.PH, first.VolumeL)
		}
		for p := range end.State.SolidMol {
			if math.Abs(end.State.SolidMol[p]-first.State.SolidMol[p]) > 1e-7 {
				t.Errorf("order %v: %s %g mol, first %g", order, tr.System.Phases[p].Name, end.State.SolidMol[p], first.State.SolidMol[p])
			}
		}
	}
}

func TestASolidThatRedissolvesLeavesNoTrace(t *testing.T) {
	direct := walked(t, plan([]*recipe.Tank{tank("T-1", "closed")}, charge("water", kg(1000)), charge("CaCl2", kg(1)), charge("Na2SO4", kg(1)), &recipe.Step{Kind: recipe.Heat, To: celsius(25)}))
	detour := walked(t, plan([]*recipe.Tank{tank("T-1", "closed")}, charge("water", kg(50)), charge("CaCl2", kg(1)), charge("Na2SO4", kg(1)), charge("water", kg(950)), &recipe.Step{Kind: recipe.Heat, To: celsius(25)}))
	if len(detour.Steps[2].After.Solids) == 0 {
		t.Fatal("nothing came down on the way")
	}
	a, b := direct.end(), detour.end()
	if len(b.Solids) != 0 || math.Abs(a.State.PH-b.State.PH) > 1e-6 {
		t.Errorf("solids %v, pH %.8f and %.8f", b.Solids, a.State.PH, b.State.PH)
	}
	clear := detour.Steps[2].After
	p := detour.System.PhaseIndex("gypsum")
	if clear.Clear.Index[p] <= 0 || math.Abs(clear.State.Index[p]) > 1e-8 {
		t.Errorf("gypsum index %.3f clear, %.3g after", clear.Clear.Index[p], clear.State.Index[p])
	}
}

func TestTransferConservesAndSplitsSolids(t *testing.T) {
	a, b := tank("T-1", "closed"), tank("T-2", "closed")
	tr := walked(t, plan([]*recipe.Tank{a, b}, charge("water", kg(100)), charge("CaSO4.2H2O", kg(2)),
		&recipe.Step{Kind: recipe.Transfer, Volume: litres(25), Into: b},
		&recipe.Step{Kind: recipe.Transfer, Volume: litres(1000), Clear: true, Into: b}))
	before, s := tr.Steps[1].After, tr.Steps[2]
	share := 25 / before.VolumeL
	if !near(s.CarriedKg, share*before.Solids[0].Kg, 1e-9) || !near(s.After.VolumeL+25, before.VolumeL, 1e-9) || !near(s.IntoAfter.VolumeL, 25, 1e-6) {
		t.Errorf("carried %g kg of %g, left %g L of %g", s.CarriedKg, before.Solids[0].Kg, s.After.VolumeL, before.VolumeL)
	}
	last := tr.Steps[3]
	if last.CarriedKg != 0 || last.After.wet() || !near(last.After.Solids[0].Kg, s.After.Solids[0].Kg, 1e-9) || !near(last.ShortByL, 1000-s.After.SolutionL, 1e-9) {
		t.Errorf("clear transfer: carried %g, wet %t, solids %v, short by %g", last.CarriedKg, last.After.wet(), last.After.Solids, last.ShortByL)
	}
}

func TestMixingTemperature(t *testing.T) {
	hot := &recipe.Material{Name: "hot water", Contents: []recipe.Content{content1("NaCl", 1e-6, recipe.MassFraction, "")}, Temperature: celsius(80)}
	r := plan([]*recipe.Tank{tank("T-1", "closed")}, charge("water", kg(10)), charge("hot water", kg(10)))
	r.Materials = []*recipe.Material{hot}
	tr := walked(t, r)
	if got := tr.end().TempK - equilibrium.ZeroCelsius; math.Abs(got-50) > 0.01 {
		t.Errorf("equal parts at 20 and 80 °C: %.3f °C", got)
	}
	if rise := tr.Steps[1].TempRiseK; math.Abs(rise-30) > 0.01 {
		t.Errorf("rise %.3f K", rise)
	}
}
