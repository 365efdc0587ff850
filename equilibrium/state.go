package equilibrium

import "math"

// Conditions are what a liquor is held under.
type Conditions struct {
	TempK float64
	// Allowed tells by phase index which solids may stand; nil means those that
	// form fast (and hot ones at their temperature), see [System.Ready].
	Allowed []bool
	// GasBar fixes partial pressures by gas index (open to an atmosphere); NaN or
	// a nil slice means no exchange of that gas.
	GasBar []float64
	// BubbleBar is the pressure above which a gas leaves as bubbles, e.g. 1.013;
	// 0 means that no gas leaves (closed and full).
	BubbleBar float64
}

// State is one equilibrium. Slices are indexed as in the System and belong to
// the State; Solve fills them without allocating when they have the right
// length ([System.NewState]).
type State struct {
	TempK         float64
	WaterKg       float64 // free water, without that in hydrates
	PH            float64 // −log10 of the activity of H^+
	IonicStrength float64 // mol/kg
	WaterActivity float64
	Osmotic       float64 // sum of molalities of all solutes, mol/kg

	LnActivity   []float64 // by component; -Inf when absent
	Molality     []float64 // by species, mol/kg
	LnGamma      []float64 // by species
	SolidMol     []float64 // by phase
	Index        []float64 // saturation index by phase, log10; -Inf when a component is absent
	GasBar       []float64 // partial pressure by gas, in equilibrium with the liquor
	GasInMol     []float64 // by gas: taken up from outside; negative = given off
	Iterations   int       // Newton steps
	ChargeError  float64   // |Σ z m| / Σ |z| m
	BalanceError float64   // largest relative error of a component's total

	seeded bool // holds a solution that a warm start may use
}

// LogActivity10 is log10 of the activity of species i.
func (s *State) LogActivity10(i int) float64 {
	return (math.Log(s.Molality[i]) + s.LnGamma[i]) / ln10
}
