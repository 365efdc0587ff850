package trace

import (
	"fmt"
	"math"

	"gonum.org/v1/gonum/mat"

	"dregs/equilibrium"
	"dregs/recipe"
)

// own adds the recipe's own phases and complexes to the tables.
func (w *walker) own() {
	var phases []*equilibrium.Phase
	var species []*equilibrium.Species
	for _, p := range w.recipe.Phases {
		phase, err := ownPhase(p)
		if err == nil {
			_, err = w.db.With([]*equilibrium.Phase{phase}, nil)
		}
		if err != nil {
			w.problem(codeUnknown, true, p.At, "a reaction such as \"CaSO4.2H2O = Ca^2+ + SO4^2- + 2 H2O\" between components of the tables", "phase %q cannot be used: %v", p.Name, err)
			continue
		}
		phases = append(phases, phase)
	}
	for _, c := range w.recipe.Complexes {
		s, err := ownSpecies(c)
		if err == nil {
			_, err = w.db.With(nil, []*equilibrium.Species{s})
		}
		if err != nil {
			w.problem(codeUnknown, true, c.At, "a reaction such as \"Ca^2+ + F^- = CaF^+\" between components of the tables", "complex %q cannot be used: %v", c.Name, err)
			continue
		}
		species = append(species, s)
	}
	if len(phases)+len(species) == 0 {
		return
	}
	db, err := w.db.With(phases, species)
	if err != nil {
		w.problem(codeUnknown, true, w.recipe.At, "", "the recipe's own phases and complexes do not go together: %v", err)
		return
	}
	w.db = db
}

func ownPhase(p *recipe.OwnPhase) (*equilibrium.Phase, error) {
	reaction, err := equilibrium.ParseReaction(p.Reaction)
	if err != nil {
		return nil, err
	}
	out := &equilibrium.Phase{Name: p.Name, Formula: p.Formula, Own: true, DensityKgL: math.NaN(),
		Forms: equilibrium.FormsFast, Origin: equilibrium.Origin{Source: p.Source, Basis: "given by the site"}}
	if p.Forms == "slow" {
		out.Forms = equilibrium.FormsSlow
	}
	found := false
	for _, t := range reaction.Left {
		if t.Name == p.Formula || t.Name == p.Name {
			if t.Coefficient != 1 {
				return nil, fmt.Errorf("one mole of %s must dissolve, not %g", t.Name, t.Coefficient)
			}
			found = true
			continue
		}
		out.Parts = append(out.Parts, equilibrium.Part{Component: t.Name, Coefficient: -t.Coefficient})
	}
	if !found {
		return nil, fmt.Errorf("its reaction does not dissolve %s", p.Formula)
	}
	for _, t := range reaction.Right {
		out.Parts = append(out.Parts, equilibrium.Part{Component: t.Name, Coefficient: t.Coefficient})
	}
	out.LogK, err = ownLogK(p.Log10K25C, p.EnthalpyKJ, p.Table, p.Uncertainty)
	return out, err
}

func ownSpecies(c *recipe.OwnComplex) (*equilibrium.Species, error) {
	reaction, err := equilibrium.ParseReaction(c.Reaction)
	if err != nil {
		return nil, err
	}
	formula, err := equilibrium.ParseFormula(c.Name)
	if err != nil {
		return nil, err
	}
	out := &equilibrium.Species{Name: c.Name, Charge: formula.Charge, Origin: equilibrium.Origin{Source: c.Source, Basis: "given by the site"}}
	found := false
	for _, t := range reaction.Right {
		if t.Name == c.Name {
			found = t.Coefficient == 1
			continue
		}
		out.Parts = append(out.Parts, equilibrium.Part{Component: t.Name, Coefficient: -t.Coefficient})
	}
	if !found {
		return nil, fmt.Errorf("its reaction does not form one mole of %s", c.Name)
	}
	for _, t := range reaction.Left {
		out.Parts = append(out.Parts, equilibrium.Part{Component: t.Name, Coefficient: t.Coefficient})
	}
	out.LogK, err = ownLogK(c.Log10K25C, c.EnthalpyKJ, c.Table, c.Uncertainty)
	return out, err
}

// ownLogK is a constant from 25 °C and an enthalpy, or from a table: log10 K =
// c1 + c3/T through two points, with c4·log10 T besides, by least squares, from
// four points on. Without either it is vouched for at 25 °C only.
func ownLogK(at25 float64, enthalpyKJ *float64, table []recipe.TempPoint, uncertainty float64) (equilibrium.LogK, error) {
	k := equilibrium.LogK{At25C: at25, EnthalpyKJ: math.NaN(), MinC: 25, MaxC: 25, Uncertainty: uncertainty}
	if enthalpyKJ != nil { // van 't Hoff, good to about 60 °C; common practice
		k.EnthalpyKJ, k.MinC, k.MaxC = *enthalpyKJ, 0, 60
	}
	if len(table) == 0 {
		return k, nil
	}
	if len(table) == 1 {
		return k, fmt.Errorf("a table against temperature needs two points")
	}
	terms := 2
	if len(table) >= 4 {
		terms = 3
	}
	a, b := mat.NewDense(len(table), terms, nil), mat.NewVecDense(len(table), nil)
	low, high := math.Inf(1), math.Inf(-1)
	for i, p := range table {
		if !(p.TempK > 0) {
			return k, fmt.Errorf("%g K is no temperature", p.TempK)
		}
		a.Set(i, 0, 1)
		a.Set(i, 1, 1000/p.TempK)
		if terms == 3 {
			a.Set(i, 2, math.Log10(p.TempK))
		}
		b.SetVec(i, p.Log10K)
		low, high = math.Min(low, p.TempK), math.Max(high, p.TempK)
	}
	var x mat.VecDense
	if err := x.SolveVec(a, b); err != nil {
		return k, fmt.Errorf("the table against temperature gives no curve, its temperatures must differ")
	}
	k.HasC = true
	k.C[0], k.C[2] = x.AtVec(0), 1000*x.AtVec(1)
	if terms == 3 {
		k.C[3] = x.AtVec(2)
	}
	k.MinC, k.MaxC = low-equilibrium.ZeroCelsius, high-equilibrium.ZeroCelsius
	if math.IsNaN(k.At25C) || k.At25C == 0 {
		k.At25C = k.At(25 + equilibrium.ZeroCelsius)
	}
	return k, nil
}
