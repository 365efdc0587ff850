package equilibrium

import (
	"math"
	"math/rand/v2"
	"testing"

	"gonum.org/v1/gonum/diff/fd"
	"gonum.org/v1/gonum/mat"
	"gonum.org/v1/gonum/optimize"
)

// plainLiquor states the equilibrium again, without anything of the solver: in the
// unknowns ln a of each component, ln W and ln of each solid's amount, as relative
// balances, with the activity model written out pair by pair. A general optimiser of gonum has to
// find the same answer.
type plainLiquor struct {
	db      *Database
	s       *System
	totals  []float64
	tempK   float64
	solids  []int
	gas     map[int]float64 // fixed pressures, bar; the gas's amount is unknown too
	present []int           // components with a total or a gas, H2O left out
}

func (p *plainLiquor) gamma(m []float64) (ln []float64, lnWater float64) {
	ionic, sum := 0.0, 0.0
	for i, sp := range p.s.Species {
		ionic += 0.5 * m[i] * sp.Charge * sp.Charge
		sum += m[i]
	}
	a := 3 * debyeHuckelAphi(p.tempK) // ln units
	root := math.Sqrt(ionic)
	ln = make([]float64, len(m))
	excess := -2 * a / 3.375 * (1 + 1.5*root - 2*math.Log(1+1.5*root) - 1/(1+1.5*root))
	for i, sp := range p.s.Species {
		ln[i] = -sp.Charge * sp.Charge * a * root / (1 + 1.5*root)
	}
	term := func(i, j int, epsilon float64) {
		ln[i] += math.Ln10 * epsilon * m[j]
		ln[j] += math.Ln10 * epsilon * m[i]
		excess += math.Ln10 * epsilon * m[i] * m[j]
	}
	for i, c := range p.s.Species {
		for j, x := range p.s.Species {
			switch {
			case c.Charge > 0 && x.Charge < 0:
				epsilon, known := 0.0, false
				for _, t := range p.db.Interactions {
					if t.Cation == c.Name && t.Anion == x.Name {
						epsilon, known = t.Epsilon, true
					}
				}
				if !known {
					epsilon = sitEstimate(c.Charge, x.Charge)
				}
				term(i, j, epsilon)
			case c.Charge == 0 && x.Charge != 0:
				if k, ok := setschenow[c.Name]; ok {
					term(i, j, k*x.Charge*x.Charge/2)
				}
			}
		}
	}
	return ln, -waterMolarMass * (sum + excess)
}

// molalities from activities, the coefficients settled by repetition.
func (p *plainLiquor) molalities(lnA []float64) (m []float64, lnWater float64) {
	m = make([]float64, len(p.s.Species))
	ln := make([]float64, len(m))
	for range 400 {
		change := 0.0
		for i, sp := range p.s.Species {
			e := math.Ln10*sp.LogK.At(p.tempK) - ln[i]
			ok := true
			for _, part := range sp.Parts {
				c := p.s.Index(part.Component)
				if c == water {
					e += part.Coefficient * lnWater
					continue
				}
				ok = ok && !math.IsInf(lnA[c], -1)
				e += part.Coefficient * lnA[c]
			}
			m[i] = 0
			if ok {
				m[i] = math.Exp(e)
			}
		}
		next, w := p.gamma(m)
		for i := range ln {
			d := next[i] - ln[i]
			change = math.Max(change, math.Abs(d))
			ln[i] += 0.7 * d
		}
		change = math.Max(change, math.Abs(w-lnWater))
		lnWater += 0.7 * (w - lnWater)
		if change < 1e-13 {
			break
		}
	}
	return m, lnWater
}

func (p *plainLiquor) unknowns() int { return len(p.present) + 1 + len(p.solids) + len(p.gas) }

// residuals of the balances, relative.
func (p *plainLiquor) residuals(r, u []float64) {
	lnA := make([]float64, len(p.s.Components))
	for i := range lnA {
		lnA[i] = math.Inf(-1)
	}
	for k, c := range p.present {
		lnA[c] = u[k]
	}
	m, lnWater := p.molalities(lnA)
	kg := math.Exp(u[len(p.present)])
	sum := make([]float64, len(p.s.Components))
	sum[water] = kg / waterMolarMass
	protons := 0.0 // all that trade in them: the scale of that balance
	for i, sp := range p.s.Species {
		for _, part := range sp.Parts {
			c := p.s.Index(part.Component)
			sum[c] += part.Coefficient * m[i] * kg
			if c == proton {
				protons += math.Abs(part.Coefficient) * m[i] * kg
			}
		}
	}
	at := len(p.present) + 1
	for _, i := range p.solids {
		index := -math.Ln10 * p.s.Phases[i].LogK.At(p.tempK)
		for _, part := range p.s.Phases[i].Parts {
			c := p.s.Index(part.Component)
			sum[c] += part.Coefficient * math.Exp(u[at])
			if c == water {
				index += part.Coefficient * lnWater
			} else {
				index += part.Coefficient * lnA[c]
			}
		}
		r[at] = index
		at++
	}
	for g := range p.s.Gases {
		bar, fixed := p.gas[g]
		if !fixed {
			continue
		}
		sp, _ := p.db.LookupSpecies(p.s.Gases[g].Species)
		pressure := math.Ln10*(sp.LogK.At(p.tempK)-p.s.Gases[g].LogK.At(p.tempK)) - math.Log(bar)
		for _, part := range sp.Parts {
			c := p.s.Index(part.Component)
			sum[c] -= part.Coefficient * u[at] // moles taken up
			if c == water {
				pressure += part.Coefficient * lnWater
			} else {
				pressure += part.Coefficient * lnA[c]
			}
		}
		r[at] = pressure
		at++
	}
	for k, c := range p.present {
		switch {
		case c == proton:
			r[k] = (sum[c] - p.totals[c]) / protons
		case p.totals[c] == 0: // only the gas brings it
			r[k] = sum[c] * 1e3
		default:
			r[k] = sum[c]/p.totals[c] - 1
		}
	}
	r[len(p.present)] = sum[water]/p.totals[water] - 1
}

func TestTenSystemsByAGeneralOptimiser(t *testing.T) {
	systems := []struct {
		name  string
		mix   map[string]float64 // mol beside 1 kg of water
		tempC float64
		gas   map[string]float64
	}{
		{"gypsum in brine", map[string]float64{"Ca^2+": 0.1, "SO4^2-": 0.1, "Na^+": 1, "Cl^-": 1}, 25, nil},
		{"phosphate buffer", map[string]float64{"K^+": 0.025, "Na^+": 0.05, "PO4^3-": 0.05, "H^+": 0.075}, 40, nil},
		{"calcite in air", map[string]float64{"Ca^2+": 0.01, "CO3^2-": 0.01}, 15, map[string]float64{"CO2": 0.00042}},
		{"calcite closed", map[string]float64{"Ca^2+": 0.003, "CO3^2-": 0.004, "H^+": 0.004, "Na^+": 0.002, "Cl^-": 0.004}, 60, nil},
		{"acetic acid", map[string]float64{"Acetate^-": 0.1, "H^+": 0.1}, 25, nil},
		{"ammonia and silver chloride", map[string]float64{"Ag^+": 0.01, "Cl^-": 0.01, "NH4^+": 0.5, "H^+": -0.5}, 25, nil},
		{"mirabilite", map[string]float64{"Na^+": 6, "SO4^2-": 3}, 10, nil},
		{"borax", map[string]float64{"Na^+": 0.02, "B(OH)3(aq)": 0.04, "H^+": -0.02}, 5, nil},
		{"struvite", map[string]float64{"Mg^2+": 0.008, "NH4^+": 0.057, "PO4^3-": 0.0065, "Cl^-": 0.073, "Na^+": 0.02, "H^+": 0.0035}, 25, nil},
		{"zinc in alkali", map[string]float64{"Zn^2+": 0.05, "SO4^2-": 0.05, "Na^+": 1, "H^+": -1}, 80, nil},
	}
	r := rand.New(rand.NewPCG(5, 6))
	for _, system := range systems {
		t.Run(system.name, func(t *testing.T) {
			var names []string
			for n := range system.mix {
				names = append(names, n)
			}
			s := mustSystem(t, names...)
			totals := totalsOf(s, system.mix)
			totals[water] += kgWater
			c := Conditions{TempK: system.tempC + ZeroCelsius, GasBar: make([]float64, len(s.Gases))}
			p := &plainLiquor{db: s.Database, s: s, totals: totals, tempK: c.TempK, gas: map[int]float64{}}
			for g := range s.Gases {
				if bar, ok := system.gas[s.Gases[g].Name]; ok {
					c.GasBar[g], p.gas[g] = bar, bar
				}
			}
			st := mustSolve(t, s, totals, c)
			for i := proton; i < len(totals); i++ {
				p.present = append(p.present, i)
			}
			for i, n := range st.SolidMol {
				if n > 0 {
					p.solids = append(p.solids, i)
				}
			}
			u := make([]float64, 0, p.unknowns())
			for _, c := range p.present {
				u = append(u, st.LnActivity[c])
			}
			u = append(u, math.Log(st.WaterKg))
			for _, i := range p.solids {
				u = append(u, math.Log(st.SolidMol[i]))
			}
			for g := range s.Gases {
				if _, ok := p.gas[g]; ok {
					u = append(u, st.GasInMol[g])
				}
			}
			want := append([]float64{}, u...)
			for i := range u {
				u[i] += 0.05 * (2*r.Float64() - 1) // somewhere else
			}
			got := p.minimise(t, u)
			for i := range want {
				if math.Abs(got[i]-want[i]) > 1e-6 {
					t.Errorf("unknown %d: %.9f by the optimiser, %.9f by the solver", i, got[i], want[i])
				}
			}
			t.Logf("%d unknowns, solids %d, pH %.6f and %.6f", len(u), len(p.solids), -got[0]/math.Ln10, st.PH)
		})
	}
}

// minimise half the sum of squares by gonum's Newton method, derivatives by
// differences.
func (p *plainLiquor) minimise(t *testing.T, u []float64) []float64 {
	n := len(u)
	r := make([]float64, n)
	jacobian := mat.NewDense(n, n, nil)
	settings := &fd.JacobianSettings{Formula: fd.Central}
	problem := optimize.Problem{
		Func: func(x []float64) float64 {
			p.residuals(r, x)
			sum := 0.0
			for _, v := range r {
				sum += v * v
			}
			return sum / 2
		},
		Grad: func(grad, x []float64) {
			p.residuals(r, x)
			fd.Jacobian(jacobian, p.residuals, x, settings)
			var g mat.VecDense
			g.MulVec(jacobian.T(), mat.NewVecDense(n, r))
			copy(grad, g.RawVector().Data)
		},
		Hess: func(h *mat.SymDense, x []float64) {
			fd.Jacobian(jacobian, p.residuals, x, settings)
			var jj mat.Dense
			jj.Mul(jacobian.T(), jacobian)
			for i := 0; i < n; i++ {
				for j := i; j < n; j++ {
					h.SetSym(i, j, jj.At(i, j))
				}
			}
		},
	}
	result, err := optimize.Minimize(problem, u, &optimize.Settings{GradientThreshold: 1e-13, MajorIterations: 60}, &optimize.Newton{})
	if result == nil {
		t.Fatal(err)
	}
	if result.F > 1e-18 {
		t.Errorf("the optimiser stays at %g (%v, %v)", result.F, result.Status, err)
	}
	return result.X
}
