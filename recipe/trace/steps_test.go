package trace

import (
	"math"
	"strings"
	"testing"

	"dregs/equilibrium"
	"dregs/recipe"
)

func one(headspace string) []*recipe.Tank { return []*recipe.Tank{tank("T-1", headspace)} }

func lastStep(tr *Trace) *Step { return tr.Steps[len(tr.Steps)-1] }

func acidBlock() *recipe.Material {
	return &recipe.Material{Name: "acid", Contents: []recipe.Content{content1("HCl", 0.1, recipe.MassFraction, "")}}
}

func TestAdjust(t *testing.T) {
	tests := []struct {
		name    string
		ph      float64
		most    *recipe.Quantity
		reached bool
		kg      float64 // NaN: whatever it takes
	}{
		{"to seven", 7, kg(1), true, math.NaN()},
		{"to three", 3, kg(1), true, math.NaN()},
		{"without a limit", 2, nil, true, math.NaN()},
		{"limit too small", 3, kg(0.01), false, 0.01},
		{"the wrong way", 13.5, kg(1), false, 0},
	}
	for _, test := range tests {
		t.Run(test.name, func(t *testing.T) {
			r := plan(one("closed"), charge("water", kg(10)), charge("NaOH", kg(0.02)),
				&recipe.Step{Kind: recipe.Adjust, PH: q(test.ph, recipe.Number), With: "acid", AtMost: test.most, ReadAt: celsius(25)})
			r.Materials = []*recipe.Material{acidBlock()}
			s := lastStep(walked(t, r))
			if s.AdjustReached != test.reached {
				t.Errorf("reached: %t with %g kg", s.AdjustReached, s.ChargedKg)
			}
			if test.reached && math.Abs(s.AtSample.State.PH-test.ph) > 2e-4 {
				t.Errorf("pH %.5f", s.AtSample.State.PH)
			}
			if !math.IsNaN(test.kg) && math.Abs(s.ChargedKg-test.kg) > 1e-12 {
				t.Errorf("%g kg used, want %g", s.ChargedKg, test.kg)
			}
		})
	}
	// 0.5 mol of caustic take 0.5 mol of acid to pH 7: 36.46 g/mol in 10 %.
	r := plan(one("closed"), charge("water", kg(10)), charge("NaOH", kg(0.0199985)),
		&recipe.Step{Kind: recipe.Adjust, PH: q(7, recipe.Number), With: "acid", AtMost: kg(1)})
	r.Materials = []*recipe.Material{acidBlock()}
	if got := lastStep(walked(t, r)).ChargedKg; math.Abs(got-0.18229) > 1e-4 {
		t.Errorf("%.5f kg of 10 %% acid for half a mole of caustic", got)
	}
}

func TestMakeUpReachesTheMark(t *testing.T) {
	r := plan(one("closed"), charge("water", kg(50)), charge("NaCl", kg(10)), &recipe.Step{Kind: recipe.Heat, To: celsius(60)},
		&recipe.Step{Kind: recipe.MakeUp, What: "water", To: litres(100), ReadAt: celsius(20)})
	s := lastStep(walked(t, r))
	if !near(s.AtSample.VolumeL, 100, 1e-6) || s.After.VolumeL <= 100 {
		t.Errorf("%.6f L at 20 °C, %.6f L as it stands", s.AtSample.VolumeL, s.After.VolumeL)
	}
	over := walked(t, plan(one("closed"), charge("water", kg(50)), &recipe.Step{Kind: recipe.MakeUp, What: "water", To: litres(20)}))
	if lastStep(over).ChargedKg != 0 || len(over.Missing) == 0 {
		t.Error("a tank above the mark must be said")
	}
}

func TestEvaporate(t *testing.T) {
	tests := []struct {
		name string
		step recipe.Step
		kg   float64
	}{
		{"mass", recipe.Step{Water: kg(30)}, 30},
		{"volume of condensate", recipe.Step{Water: litres(30)}, 29.946},
		{"to a mass", recipe.Step{To: kg(80)}, 30},
		{"to a volume", recipe.Step{To: litres(60)}, math.NaN()},
	}
	for _, test := range tests {
		s := test.step
		s.Kind = recipe.Evaporate
		tr := walked(t, plan(one("closed"), charge("water", kg(100)), charge("NaCl", kg(10)), &s))
		last := lastStep(tr)
		off := last.Before.MassKg - last.After.MassKg
		if !math.IsNaN(test.kg) && math.Abs(off-test.kg) > 1e-3 {
			t.Errorf("%s: %.4f kg off, want %.4f", test.name, off, test.kg)
		}
		if s.To != nil && s.To.Dimension == recipe.Volume && !near(last.After.VolumeL, s.To.Value, 1e-6) {
			t.Errorf("%s: %.5f L", test.name, last.After.VolumeL)
		}
	}
	dry := Walk(plan(one("closed"), charge("water", kg(1)), &recipe.Step{Kind: recipe.Evaporate, Water: kg(2)}), Options{})
	if len(dry.Problems) != 1 || len(dry.Steps) != 1 {
		t.Errorf("more water off than there is: problems %v", dry.Problems)
	}
}

func TestCarbonDioxideBubblesUnlessClosed(t *testing.T) {
	for _, head := range []string{"air", "closed"} {
		r := plan(one(head), charge("water", kg(10)), charge("Na2CO3", kg(0.5)), charge("acid", kg(3)))
		r.Materials = []*recipe.Material{acidBlock()}
		s := lastStep(walked(t, r))
		mol := 0.0
		for _, g := range s.GasOut {
			mol += g.Mol
			if !near(g.LitresAt20C, 24.06*g.Mol, 1e-12) {
				t.Errorf("%g L of %g mol", g.LitresAt20C, g.Mol)
			}
		}
		if (head == "closed") != (mol == 0) {
			t.Errorf("%s: %g mol of gas", head, mol)
		}
		// 8.2 mol of acid on 4.72 mol of soda: at most 3.5 mol leave, 0.4 stay dissolved
		if head == "air" && (mol < 2.5 || mol > 3.6) {
			t.Errorf("%g mol of CO2 left", mol)
		}
	}
}

func TestAirAndColdAndAged(t *testing.T) {
	tanks := one("air")
	tanks[0].Coldest = celsius(5)
	tr := walked(t, plan(tanks, charge("water", kg(100)), charge("NaOH", kg(0.04))))
	s := lastStep(tr)
	if s.Air == nil || s.Air.State.PH > s.After.State.PH-1 {
		t.Error("caustic under air must fall in pH")
	}
	if s.Cold == nil || math.Abs(s.Cold.TempK-278.15) > 1e-9 {
		t.Error("no cold liquor")
	}
	if s.Aged == nil || tr.Steps[0].Air != nil {
		t.Error("aged and aired are for the last step of a stage")
	}
	if closed := lastStep(walked(t, plan(one("closed"), charge("water", kg(1))))); closed.Air != nil || closed.Cold != nil {
		t.Error("a closed tank meets no air, and has no coldest place")
	}
	held := plan(one("air"), charge("water", kg(100)), charge("NaOH", kg(0.04)), &recipe.Step{Kind: recipe.Hold, For: minutes(9 * 60)})
	if h := lastStep(walked(t, held)); h.Air != nil || !near(h.After.State.PH, s.Air.State.PH, 1e-6) || h.End-h.Begin != 540 {
		t.Errorf("held open: pH %.3f, aired %.3f, minutes %g", h.After.State.PH, s.Air.State.PH, h.End-h.Begin)
	}
}

func TestGivenPartialPressureHolds(t *testing.T) {
	tanks := []*recipe.Tank{{Name: "T-1", Headspace: recipe.Headspace{Kind: "given", PartialPa: map[string]float64{"CO2": 1000}}}}
	tr := walked(t, plan(tanks, charge("water", kg(1))))
	for i, g := range tr.System.Gases {
		if g.Name == "CO2" && !near(tr.end().State.GasBar[i], 0.01, 1e-6) {
			t.Errorf("%g bar", tr.end().State.GasBar[i])
		}
	}
	before := tr.end()
	for i, c := range tr.System.Components {
		if c.Name == "CO3^2-" && !(before.Totals[i] > 1e-5) {
			t.Errorf("%g mol of carbonate taken up", before.Totals[i])
		}
	}
}

func TestFeedLineOfALiquidOnly(t *testing.T) {
	caustic := &recipe.Material{Name: "caustic", Contents: []recipe.Content{content1("NaOH", 0.2, recipe.MassFraction, "")}}
	magnesium := &recipe.Material{Name: "magnesium", Contents: []recipe.Content{content1("Mg", 0.01, recipe.MassFraction, ""), content1("Cl", 0.02917, recipe.MassFraction, "")}}
	r := plan(one("closed"), charge("water", kg(100)), charge("magnesium", kg(10)), dose("caustic", kg(0.01)), dose("NaCl", kg(1)))
	r.Materials = []*recipe.Material{caustic, magnesium}
	tr := walked(t, r)
	f := tr.Steps[2].Feed
	if f == nil || len(f.Points) < 10 {
		t.Fatal("no feed line for a solution")
	}
	brucite := tr.System.PhaseIndex("brucite")
	highest := math.Inf(-1)
	for _, p := range f.Points {
		highest = math.Max(highest, p.Index[brucite])
	}
	if highest < 2 {
		t.Errorf("brucite index %.2f at the feed point", highest)
	}
	if tr.Steps[3].Feed != nil {
		t.Error("a solid has no feed line")
	}
}

func TestTogetherIsOneMix(t *testing.T) {
	pair := &recipe.Step{Kind: recipe.Together, Over: minutes(60), Doses: []*recipe.Step{dose("CaCl2", kg(1)), dose("Na2SO4", kg(1))}}
	tr := walked(t, plan(one("closed"), charge("water", kg(100)), pair, &recipe.Step{Kind: recipe.Heat, To: celsius(25)}))
	both := walked(t, plan(one("closed"), charge("water", kg(100)), charge("CaCl2", kg(1)), charge("Na2SO4", kg(1)), &recipe.Step{Kind: recipe.Heat, To: celsius(25)}))
	if len(tr.Steps) != 4 || !near(tr.end().MassKg, both.end().MassKg, 1e-12) || math.Abs(tr.end().State.PH-both.end().State.PH) > 1e-6 {
		t.Errorf("%d steps, %.9f kg", len(tr.Steps), tr.end().MassKg)
	}
	for _, s := range tr.Steps[1:3] {
		if s.Begin != 0 || s.End != 60 {
			t.Errorf("%s from %g to %g min", s.What, s.Begin, s.End)
		}
	}
}

func TestFilterTakesSolidsAndSomeLiquor(t *testing.T) {
	a, b := tank("T-1", "closed"), tank("T-2", "closed")
	f := &recipe.Step{Kind: recipe.Filter, Into: b, Moisture: q(0.5, recipe.MassFraction)}
	s := lastStep(walked(t, plan([]*recipe.Tank{a, b}, charge("water", kg(100)), charge("CaSO4.2H2O", kg(10)), f)))
	if !near(s.IntoAfter.MassKg, 110-2*s.RemovedKg, 1e-9) || s.After.MassKg != 0 || len(s.IntoAfter.Solids) != 0 {
		t.Errorf("filtrate %.4f kg, cake solids %.4f kg, left %.4f kg, solids through %v", s.IntoAfter.MassKg, s.RemovedKg, s.After.MassKg, s.IntoAfter.Solids)
	}
}

func TestLiquorFromAnotherRecipe(t *testing.T) {
	first := plan(one("closed"), charge("water", kg(100)), charge("NaCl", kg(5)))
	r := plan([]*recipe.Tank{tank("T-9", "closed")}, charge("mother liquor", kg(10)))
	r.Liquors = []*recipe.LiquorFrom{{Name: "mother liquor", From: "first.recipe.hcl", Recipe: first, Tank: "T-1"}}
	tr := walked(t, r)
	if got, want := tr.end().Totals[tr.System.Index("Na^+")], 10*5/105.0/0.05844; !near(got, want, 1e-4) {
		t.Errorf("%g mol of sodium, want %g", got, want)
	}
	r.Liquors[0].Tank = "T-7"
	if bad := Walk(r, Options{}); len(bad.Problems) == 0 {
		t.Error("a tank that is not there must be told")
	}
}

func TestWhatIsNotKnownIsSaid(t *testing.T) {
	r := plan(one("closed"), charge("water", kg(1)), charge("gum", kg(1)), charge("blend", kg(1)))
	r.Materials = []*recipe.Material{{Name: "gum", Inert: true},
		{Name: "blend", Contents: []recipe.Content{content1("NaCl", 0.1, recipe.MassFraction, ""), content1("Xyzzy", 0.02, recipe.MassFraction, "")}}}
	tr := walked(t, r)
	if len(tr.Missing) != 1 || !strings.Contains(tr.Missing[0].Why, "inert") || tr.Missing[0].What != "Xyzzy" {
		t.Errorf("missing %v", tr.Missing)
	}
	if end := tr.end(); !near(end.InertKg, 1.02, 1e-12) || !near(end.MassKg, 3, 1e-12) {
		t.Errorf("inert %g kg of %g", end.InertKg, end.MassKg)
	}
	bad := Walk(plan(one("closed"), charge("water", kg(1)), charge("Xyzzy", kg(1)), charge("NaCl", kg(1))), Options{})
	if len(bad.Problems) != 1 || !bad.Problems[0].Fatal || len(bad.Steps) != 1 {
		t.Errorf("problems %v, %d steps", bad.Problems, len(bad.Steps))
	}
}

func TestOwnPhase(t *testing.T) {
	heat := 10.0
	r := plan(one("closed"), charge("water", kg(1)), charge("NaCl", kg(0.05)))
	r.Phases = []*recipe.OwnPhase{{Name: "house salt", Formula: "NaCl", Reaction: "NaCl = Na^+ + Cl^-", Log10K25C: -2, EnthalpyKJ: &heat, Uncertainty: 0.1, Source: "invented"}}
	tr := walked(t, r)
	p := tr.System.PhaseIndex("house salt")
	if p < 0 || tr.end().State.SolidMol[p] <= 0 {
		t.Error("the house salt does not come down")
	}
	r.Phases[0].Reaction = "NaCl = Na^+"
	if bad := Walk(r, Options{}); len(bad.Problems) == 0 || !bad.Problems[0].Fatal {
		t.Error("a reaction out of balance must be told")
	}
}

func TestOwnConstantAgainstTemperature(t *testing.T) {
	points := []recipe.TempPoint{{TempK: 278.15, Log10K: -2.2}, {TempK: 298.15, Log10K: -2}, {TempK: 338.15, Log10K: -1.7}}
	k, err := ownLogK(0, nil, points[:2], 0.1)
	if err != nil || math.Abs(k.At(278.15)+2.2) > 1e-9 || math.Abs(k.At(298.15)+2) > 1e-9 || math.Abs(k.At25C+2) > 1e-9 {
		t.Errorf("two points: %v, %.6f and %.6f", err, k.At(278.15), k.At(298.15))
	}
	if _, err := ownLogK(0, nil, []recipe.TempPoint{points[0], points[0]}, 0.1); err == nil {
		t.Error("one temperature twice is no curve")
	}
}

func TestMolalContents(t *testing.T) {
	r := plan(one("closed"), charge("brine", kg(1)))
	r.Materials = []*recipe.Material{{Name: "brine", Density: q(1.1, recipe.Density), Contents: []recipe.Content{content1("NaCl", 2, recipe.Molality, "")}}}
	tr := walked(t, r)
	st := tr.end().State
	if got := tr.end().Totals[tr.System.Index("Na^+")] / st.WaterKg; !near(got, 2, 1e-6) {
		t.Errorf("%.7f mol/kg, want 2", got)
	}
}

func TestVolumesAddAbout(t *testing.T) {
	tr := walked(t, plan(one("closed"), charge("water", litres(500)), charge("NaCl", kg(5)), charge("water", litres(300))))
	a, b := tr.Steps[1].After.VolumeL, tr.Steps[2].After.VolumeL
	if math.Abs(b-a-300) > 0.1 {
		t.Errorf("%.4f L and 300 L make %.4f L", a, b)
	}
}

func TestRepeatRunsIntoTheHeel(t *testing.T) {
	r := plan(one("closed"), charge("water", kg(10)), charge("NaCl", kg(1)), &recipe.Step{Kind: recipe.Transfer, Volume: litres(8)})
	r.Repeat = 3
	tr := walked(t, r)
	if len(tr.Steps) != 9 || tr.Steps[3].Before.MassKg < 1 {
		t.Errorf("%d steps, second batch starts on %g kg", len(tr.Steps), tr.Steps[3].Before.MassKg)
	}
}

func TestAnEmptyTankBreaksNothing(t *testing.T) {
	for kind := recipe.Charge; kind <= recipe.Expect; kind++ {
		s := &recipe.Step{Kind: kind, What: "water", With: "water", To: celsius(50), PH: q(7, recipe.Number), Gas: "CO2"}
		Walk(plan(one("air"), s), Options{})
	}
	solids := walked(t, plan(one("air"), charge("CaSO4.2H2O", kg(1)), &recipe.Step{Kind: recipe.Heat, To: celsius(40)}))
	if end := solids.end(); !near(end.MassKg, 1, 1e-12) || end.TempK != 40+equilibrium.ZeroCelsius {
		t.Errorf("dry gypsum: %g kg at %g K", end.MassKg, end.TempK)
	}
}
