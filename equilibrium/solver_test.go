package equilibrium

import (
	"errors"
	"math"
	"math/rand/v2"
	"testing"

	"pgregory.net/rapid"
)

// mix adds moles of each component; H^+ and H2O go in by formula.
func totalsOf(s *System, amounts map[string]float64) []float64 {
	t := make([]float64, len(s.Components))
	for name, n := range amounts {
		i := s.Index(name)
		if i < 0 {
			panic("no component " + name)
		}
		t[i] += n
	}
	return t
}

const kgWater = 1 / waterMolarMass // mol

func mustSystem(t testing.TB, components ...string) *System {
	t.Helper()
	s, err := Default().NewSystem(components)
	if err != nil {
		t.Fatal(err)
	}
	return s
}

func mustSolve(t testing.TB, s *System, totals []float64, c Conditions) *State {
	t.Helper()
	out := s.NewState()
	if err := s.NewSolver().Solve(totals, &c, out); err != nil {
		t.Fatal(err)
	}
	return out
}

// verify checks the conditions of equilibrium independently of the solver's own
// bookkeeping: totals of every component, charge, and the index of every solid.
func verify(t interface{ Errorf(string, ...any) }, s *System, totals []float64, c *Conditions, st *State) {
	sum := make([]float64, len(s.Components))
	size := make([]float64, len(s.Components))
	add := func(parts []Part, mol float64) {
		for _, p := range parts {
			i := s.Index(p.Component)
			sum[i] += p.Coefficient * mol
			size[i] = math.Max(size[i], math.Abs(p.Coefficient*mol))
		}
	}
	sum[water] = st.WaterKg / waterMolarMass
	charge, gross := 0.0, 0.0
	for i, sp := range s.Species {
		n := st.Molality[i] * st.WaterKg
		add(sp.Parts, n)
		charge += n * sp.Charge
		gross += n * math.Abs(sp.Charge)
	}
	for i, p := range s.Phases {
		add(p.Parts, st.SolidMol[i])
	}
	for i, g := range s.Gases {
		for _, sp := range s.Species {
			if sp.Name == g.Species {
				add(sp.Parts, -st.GasInMol[i])
			}
		}
	}
	for i := range sum {
		tolerance := 1e-10*math.Max(size[i], math.Abs(totals[i])) + 1e-22*totals[water]
		if math.Abs(sum[i]-totals[i]) > tolerance && !(i == water && math.Abs(sum[i]-totals[i]) < 2e-9*totals[i]) {
			t.Errorf("%s: %.15g mol in the state, %.15g given", s.Components[i].Name, sum[i], totals[i])
		}
	}
	net := 0.0
	for i, c := range s.Components {
		net += c.Charge * totals[i]
	}
	// What is dissolved is the difference of totals and solids, so the rounding of
	// the totals is allowed for.
	held := 0.0
	for i, c := range s.Components {
		held += math.Abs(c.Charge * totals[i])
	}
	if math.Abs(charge-net) > 1e-10*gross+2e-15*held+1e-18 {
		t.Errorf("charge %.3g of %.3g", charge, gross)
	}
	allowed := c.Allowed
	if allowed == nil {
		allowed = make([]bool, len(s.Phases))
		s.Ready(c.TempK, allowed)
	}
	for i, p := range s.Phases {
		switch {
		case st.SolidMol[i] < 0:
			t.Errorf("%s: %g mol", p.Name, st.SolidMol[i])
		case st.SolidMol[i] > 0 && math.Abs(st.Index[i]) > 1e-8:
			t.Errorf("%s stands with saturation index %g", p.Name, st.Index[i])
		case st.SolidMol[i] > 0 && !allowed[i]:
			t.Errorf("%s stands and is not allowed", p.Name)
		case allowed[i] && st.Index[i] > 1e-8:
			t.Errorf("%s is absent with saturation index %g", p.Name, st.Index[i])
		}
	}
}

func TestGypsumInWater(t *testing.T) {
	s := mustSystem(t, "Ca^2+", "SO4^2-")
	totals := totalsOf(s, map[string]float64{"H2O": kgWater + 0.04, "Ca^2+": 0.02, "SO4^2-": 0.02})
	c := Conditions{TempK: 298.15}
	st := mustSolve(t, s, totals, c)
	verify(t, s, totals, &c, st)
	left := st.SolidMol[s.PhaseIndex("gypsum")]
	dissolved := 0.02 - left
	t.Logf("gypsum dissolved %.5f mol/kg, pH %.3f, steps %d", dissolved, st.PH, st.Iterations)
	// 0.0152 mol/kg: Marshall and Slusher 1966, J. Phys. Chem. 70, 4015 (from memory)
	if math.Abs(dissolved/0.0152-1) > 0.05 {
		t.Errorf("gypsum dissolves to %.5f mol/kg, want 0.0152 within 5 %%", dissolved)
	}
}

// randomTotals draws a neutral mixture of salts, acids and bases over 12 orders
// of magnitude.
func randomTotals(r *rand.Rand, s *System) []float64 {
	totals := make([]float64, len(s.Components))
	totals[water] = kgWater
	charge := 0.0
	for i := proton + 1; i < len(s.Components); i++ {
		if r.IntN(5) == 0 {
			continue
		}
		totals[i] = math.Pow(10, -12+12.3*r.Float64())
		charge += totals[i] * s.Components[i].Charge
	}
	totals[proton] = -charge // hydroxide or acid makes it neutral
	return totals
}

var wide = []string{"Na^+", "K^+", "Ca^2+", "Mg^2+", "Fe^3+", "Al^3+", "Zn^2+", "Cu^2+", "NH4^+", "Cl^-", "SO4^2-", "CO3^2-", "PO4^3-", "F^-", "Citrate^3-", "EDTA^4-", "H4SiO4(aq)", "B(OH)3(aq)", "Ag^+", "HS^-"}

func TestRandomMixturesHoldTheConditions(t *testing.T) {
	s := mustSystem(t, wide...)
	sv := s.NewSolver()
	rounds := 3000
	if testing.Short() {
		rounds = 300
	}
	failures := 0
	r := rand.New(rand.NewPCG(1, 2))
	st := s.NewState()
	for k := 0; k < rounds; k++ {
		totals := randomTotals(r, s)
		c := Conditions{TempK: 273.15 + 100*r.Float64()}
		if k%3 != 0 {
			st = s.NewState()
		}
		if err := sv.Solve(totals, &c, st); err != nil {
			if errors.Is(err, ErrNoWater) {
				continue
			}
			failures++
			t.Errorf("round %d: %v", k, err)
			if failures > 5 {
				return
			}
			continue
		}
		verify(t, s, totals, &c, st)
		if t.Failed() {
			t.Fatalf("round %d, totals %v", k, totals)
		}
	}
}

// The same answer from any start: cold, and warm from an unrelated liquor.
func TestAnyStartGivesTheSameState(t *testing.T) {
	s := mustSystem(t, wide...)
	sv := s.NewSolver()
	rapid.Check(t, func(t *rapid.T) {
		r := rand.New(rand.NewPCG(rapid.Uint64().Draw(t, "seed"), 7))
		a, b := randomTotals(r, s), randomTotals(r, s)
		c := Conditions{TempK: 298.15}
		cold, warm := s.NewState(), s.NewState()
		if sv.Solve(a, &c, cold) != nil || sv.Solve(b, &c, warm) != nil || cold.IonicStrength > 3 {
			return // strong liquors may have two balances; they are reported as outside the range
		}
		if err := sv.Solve(a, &c, warm); err != nil {
			t.Fatal(err)
		}
		if math.Abs(cold.PH-warm.PH) > 1e-6 {
			t.Errorf("pH %.9f cold, %.9f warm", cold.PH, warm.PH)
		}
		for i := range cold.SolidMol {
			if math.Abs(cold.SolidMol[i]-warm.SolidMol[i]) > 1e-7*(1+cold.SolidMol[i]) {
				t.Errorf("%s: %g mol cold, %g warm", s.Phases[i].Name, cold.SolidMol[i], warm.SolidMol[i])
			}
		}
	})
}

func TestPureWaterAndTraces(t *testing.T) {
	s := mustSystem(t, "Na^+", "Cl^-", "Ag^+")
	c := Conditions{TempK: 298.15}
	pure := mustSolve(t, s, totalsOf(s, map[string]float64{"H2O": kgWater}), c)
	if math.Abs(pure.PH-7) > 0.01 {
		t.Errorf("pure water: pH %.4f", pure.PH)
	}
	totals := totalsOf(s, map[string]float64{"H2O": kgWater, "Na^+": 10, "Cl^-": 10 + 1e-12, "Ag^+": 1e-12})
	trace := s.NewState()
	allowed := make([]bool, len(s.Phases)) // nothing may come down: 10 mol/kg is above saturation
	c.Allowed = allowed
	if err := s.NewSolver().Solve(totals, &c, trace); err != nil {
		t.Fatal(err)
	}
	verify(t, s, totals, &c, trace)
	c.Allowed = nil
	if err := s.NewSolver().Solve(totalsOf(s, map[string]float64{"Na^+": 1, "Cl^-": 1}), &c, trace); !errors.Is(err, ErrNoWater) {
		t.Errorf("a dry tank: %v", err)
	}
}

func TestSolveAllocatesNothing(t *testing.T) {
	s, totals := benchmarkMix(t)
	sv, st := s.NewSolver(), s.NewState()
	c := &Conditions{TempK: 298.15}
	if n := testing.AllocsPerRun(50, func() {
		if err := sv.Solve(totals, c, st); err != nil {
			t.Fatal(err)
		}
	}); n != 0 {
		t.Errorf("%g allocations a solve", n)
	}
}

// benchmarkMix is a dilute process water of 12 components.
func benchmarkMix(t testing.TB) (*System, []float64) {
	s := mustSystem(t, "Na^+", "K^+", "Ca^2+", "Mg^2+", "Zn^2+", "Cl^-", "SO4^2-", "CO3^2-", "PO4^3-", "F^-")
	return s, totalsOf(s, map[string]float64{"H2O": kgWater, "Na^+": 0.0235, "K^+": 0.002, "Ca^2+": 0.003, "Mg^2+": 0.001, "Zn^2+": 1e-5,
		"Cl^-": 0.01, "SO4^2-": 0.005, "CO3^2-": 0.004, "PO4^3-": 0.001, "F^-": 1e-4, "H^+": 0.004 + 0.00152 - 0.00004})
}

func BenchmarkSolveDilute(b *testing.B) {
	benchmarkSolve(b, 1)
}

// BenchmarkSolveConcentrated is the same water thirty times stronger.
func BenchmarkSolveConcentrated(b *testing.B) {
	benchmarkSolve(b, 30)
}

func benchmarkSolve(b *testing.B, strength float64) {
	s, totals := benchmarkMix(b)
	for i := proton; i < len(totals); i++ {
		totals[i] *= strength
	}
	other := append([]float64{}, totals...)
	for i := proton; i < len(other); i++ {
		other[i] *= 1.01
	}
	sv, st := s.NewSolver(), s.NewState()
	c := &Conditions{TempK: 298.15, Allowed: make([]bool, len(s.Phases))}
	s.Ready(c.TempK, c.Allowed)
	allowed := 0
	for i := range c.Allowed { // 30 of them
		c.Allowed[i] = c.Allowed[i] && allowed < 30
		if c.Allowed[i] {
			allowed++
		}
	}
	b.ReportAllocs()
	steps := 0
	for i := 0; b.Loop(); i++ {
		now := totals
		if i&1 == 1 {
			now = other
		}
		if err := sv.Solve(now, c, st); err != nil {
			b.Fatal(err)
		}
		steps += st.Iterations
	}
	b.ReportMetric(float64(steps)/float64(b.N), "steps/op")
	b.ReportMetric(float64(len(s.Components)), "components")
	b.ReportMetric(float64(len(s.Species)), "species")
	b.ReportMetric(float64(allowed), "phases")
}

func FuzzSolve(f *testing.F) {
	f.Add(uint64(1), 25.0)
	f.Add(uint64(99), 3.0)
	s, err := Default().NewSystem(wide)
	if err != nil {
		f.Fatal(err)
	}
	sv, st := s.NewSolver(), s.NewState()
	f.Fuzz(func(t *testing.T, seed uint64, tempC float64) {
		if !(tempC >= 0 && tempC <= 100) {
			return
		}
		totals := randomTotals(rand.New(rand.NewPCG(seed, 3)), s)
		c := Conditions{TempK: tempC + ZeroCelsius}
		if err := sv.Solve(totals, &c, st); err != nil {
			if errors.Is(err, ErrNoWater) {
				return
			}
			t.Fatal(err)
		}
		verify(t, s, totals, &c, st)
	})
}
