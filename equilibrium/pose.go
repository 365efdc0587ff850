package equilibrium

import (
	"fmt"
	"math"
)

// pose sets up constants, active components, species and constraints.
func (sv *Solver) pose(totals []float64, c *Conditions) error {
	s := sv.sys
	if !(totals[water] > 0) || math.IsInf(totals[water], 0) {
		return fmt.Errorf("%w: total of water is %g mol", ErrNoWater, totals[water])
	}
	scaleKg := totals[water] * waterMolarMass
	for i, t := range totals {
		if math.IsNaN(t) || math.IsInf(t, 0) {
			return fmt.Errorf("total of %s is %g mol", s.Components[i].Name, t)
		}
		sv.b[i] = t / scaleKg
		if i > proton && sv.b[i] < 0 {
			if sv.b[i] < -1e-12 {
				return fmt.Errorf("%w: %s %g mol", ErrNegativeTotal, s.Components[i].Name, t)
			}
			sv.b[i] = 0
		}
	}
	if c.TempK != sv.tempK {
		sv.tempK, sv.aphi = c.TempK, debyeHuckelAphi(c.TempK)
		for i, sp := range s.Species {
			sv.lnKSpecies[i] = ln10 * sp.LogK.At(c.TempK)
		}
		for i, p := range s.Phases {
			sv.lnKPhase[i] = ln10 * p.LogK.At(c.TempK)
		}
		for i, g := range s.Gases {
			sv.lnKGas[i] = ln10*g.LogK.At(c.TempK) - sv.lnKSpecies[s.gasSpecies[i]]
		}
		s.Ready(c.TempK, sv.allowedDefault)
	}
	sv.most = 0
	for _, b := range sv.b[proton:] {
		sv.most = math.Max(sv.most, math.Abs(b))
	}
	if sv.samePose(c) {
		return nil
	}
	for i := range sv.local {
		sv.local[i] = -1
	}
	sv.active = sv.active[:0]
	for i := proton; i < len(s.Components); i++ {
		if i == proton || sv.b[i] > absentMolal {
			sv.activate(i)
		}
	}
	if c.GasBar != nil {
		for g := range s.Gases {
			if c.GasBar[g] > 0 {
				row := &s.species
				for k := row.start[s.gasSpecies[g]]; k < row.start[s.gasSpecies[g]+1]; k++ {
					if i := int(row.component[k]); sv.local[i] < 0 {
						sv.activate(i)
					}
				}
			}
		}
	}
	sv.species, sv.row, sv.nu = sv.species[:0], sv.row[:0], sv.nu[:0]
	sv.start, sv.pairStart = append(sv.start[:0], 0), append(sv.pairStart[:0], 0)
	sv.pairAt, sv.pair = sv.pairAt[:0], sv.pair[:0]
	for i := range s.Species {
		if !sv.present(&s.species, i) {
			continue
		}
		sv.species = append(sv.species, int32(i))
		for k := s.species.start[i]; k < s.species.start[i+1]; k++ {
			sv.row = append(sv.row, sv.local[s.species.component[k]])
			sv.nu = append(sv.nu, s.species.coefficient[k])
		}
		sv.start = append(sv.start, int32(len(sv.row)))
		sv.addPairs(int(sv.start[len(sv.start)-2]), len(sv.row))
	}
	sv.constrain(c)
	return nil
}

// samePose tells whether the components present and the conditions are those of
// the last call, so that its index tables serve again; it remembers them.
func (sv *Solver) samePose(c *Conditions) bool {
	p := &sv.posed
	same := p.done && p.tempK == c.TempK && p.bubbleBar == c.BubbleBar
	p.done, p.tempK, p.bubbleBar = true, c.TempK, c.BubbleBar
	for i, b := range sv.b {
		if present := b > absentMolal; present != p.present[i] {
			p.present[i], same = present, false
		}
	}
	allowed := c.Allowed
	if allowed == nil {
		allowed = sv.allowedDefault
	}
	for i, a := range allowed {
		if a != p.allowed[i] {
			p.allowed[i], same = a, false
		}
	}
	for i := range p.gasBar {
		bar := 0.0
		if c.GasBar != nil && c.GasBar[i] > 0 {
			bar = c.GasBar[i]
		}
		if bar != p.gasBar[i] {
			p.gasBar[i], same = bar, false
		}
	}
	return same
}

// addPairs lists the products of coefficients of one species for the Hessian.
func (sv *Solver) addPairs(first, last int) {
	m := int32(len(sv.active))
	for k := first; k < last; k++ {
		for l := first; l <= k; l++ {
			r, q := sv.row[k], sv.row[l]
			if q > r {
				r, q = q, r
			}
			sv.pairAt = append(sv.pairAt, r*m+q)
			sv.pair = append(sv.pair, sv.nu[k]*sv.nu[l])
		}
	}
	sv.pairStart = append(sv.pairStart, int32(len(sv.pair)))
}

func (sv *Solver) activate(component int) {
	sv.local[component] = int32(len(sv.active))
	sv.active = append(sv.active, int32(component))
}

func (sv *Solver) present(rows *sparse, i int) bool {
	for k := rows.start[i]; k < rows.start[i+1]; k++ {
		if sv.local[rows.component[k]] < 0 {
			return false
		}
	}
	return true
}

// constrain lists the fixed gases first: they are always in the working set.
func (sv *Solver) constrain(c *Conditions) {
	s := sv.sys
	sv.cons = sv.cons[:0]
	for g := range s.Gases {
		if c.GasBar != nil && c.GasBar[g] > 0 && sv.present(&s.species, s.gasSpecies[g]) {
			sv.addConstraint(gasFixed, g, &s.species, s.gasSpecies[g], s.speciesWater[s.gasSpecies[g]], sv.lnKGas[g]+math.Log(c.GasBar[g]))
		}
	}
	sv.quad.equalities = len(sv.cons)
	if c.BubbleBar > 0 {
		for g := range s.Gases {
			if (c.GasBar == nil || !(c.GasBar[g] > 0)) && sv.present(&s.species, s.gasSpecies[g]) {
				sv.addConstraint(gasBubble, g, &s.species, s.gasSpecies[g], s.speciesWater[s.gasSpecies[g]], sv.lnKGas[g]+math.Log(c.BubbleBar))
			}
		}
	}
	allowed := c.Allowed
	if allowed == nil {
		allowed = sv.allowedDefault
	}
	for p := range s.Phases {
		if allowed[p] && sv.present(&s.phases, p) {
			sv.addConstraint(solidPhase, p, &s.phases, p, s.phaseWater[p], sv.lnKPhase[p])
		}
	}
}

func (sv *Solver) addConstraint(kind constraintKind, index int, rows *sparse, i int, water, lnK float64) {
	n := len(sv.active)
	at := len(sv.cons) * n
	dense := sv.rows[at : at+n]
	for k := range dense {
		dense[k] = 0
	}
	for k := rows.start[i]; k < rows.start[i+1]; k++ {
		dense[sv.local[rows.component[k]]] += rows.coefficient[k]
	}
	sv.cons = append(sv.cons, constraint{kind, index, water, lnK})
}
