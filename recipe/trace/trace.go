package trace

import (
	"dregs/equilibrium"
	"dregs/equilibrium/catalogue"
	"dregs/recipe"
)

// Trace is the walk of one recipe.
type Trace struct {
	Recipe    *recipe.Recipe
	System    *equilibrium.System // every component of the recipe
	Steps     []*Step             // in order; the heels come first, as steps of stage nil
	Problems  []recipe.Problem    // what the walk found unusable (an element without data, an impossible amount)
	Missing   []Missing
	Materials map[string]*Charged // by name as the recipe uses it
}

// Missing is something that the computation had to leave out or take on trust.
type Missing struct {
	What string       // the ingredient or phase
	Why  string       // in words
	At   recipe.Range // where it is first used
	Step *Step        // nil when it holds for the whole recipe
	// Blind is set when part of the chemistry is left out for it; otherwise
	// something usual was assumed.
	Blind bool
}

// Charged is a material resolved to chemistry.
type Charged struct {
	Name              string
	Substance         *catalogue.Substance // nil for mixtures described by contents
	Water             *recipe.Water        // set for make-up waters
	Material          *recipe.Material     // set when a material block describes it
	Parts             []equilibrium.Part   // mol per kg charged, all components, water of solutions included
	InertPerKg        float64              // kg of inert matter per kg
	DensityKgL        float64              // NaN when not known
	TempK             float64
	SolidPhases       []int   // phases of the System that this material is, when it is charged as a solid
	HeatKJPerKg       float64 // enthalpy of solution, positive cools; NaN unknown
	Hazards           []string
	ImbalanceFraction float64 // of a water analysis: |cations − anions| / sum of both, before closing it
	BalancedWith      string  // the ion that closed it

	liquid      bool    // a solution or a liquor: it has a feed line
	molPerKg    float64 // of the substance, 0 for mixtures
	heatPerKgK  float64 // heat capacity, kJ/(kg K)
	unavailable bool    // could not be resolved; a problem says why
}

// Step is what one step of the recipe did to one tank.
type Step struct {
	Index      int
	Source     *recipe.Step  // nil for a heel
	Stage      *recipe.Stage // nil for a heel
	At         recipe.Range
	What       string // "dose calcium nitrate", for screens
	Tank       *recipe.Tank
	Begin, End float64 // minutes since the start of the batch

	Before, After *Liquor // contents of the tank

	Charged     *Charged // what was added, nil when nothing was
	ChargedKg   float64
	ChargedMol  float64       // of the substance, when it is one
	Undissolved []Undissolved // of the charge itself

	Feed     *FeedLine // for what enters at a feed point
	Cold     *Liquor   // After at the coldest temperature of its tank or lines, nothing formed yet (see Liquor.Clear), nil when not colder
	Air      *Liquor   // After brought into equilibrium with the air, nil when closed or already open
	Aged     *Liquor   // After with slow phases allowed
	AtSample *Liquor   // sample and adjust: After at the temperature of reading

	Into      *recipe.Tank // transfer, decant, filter
	IntoAfter *Liquor
	CarriedKg float64 // solids carried into the next tank, kg
	Carried   []PhaseAmount
	RemovedKg float64 // solids left on a filter

	GasOut []GasAmount // given off in this step

	ShortByL       float64 // taken out more than there was, L
	LowestVolumeL  float64 // smallest and greatest volume within the step
	HighestVolumeL float64
	AdjustReached  bool    // adjust: the target was reached within at_most
	TempRiseK      float64 // on mixing
}

// Undissolved is what is left of a charge.
type Undissolved struct {
	Phase        int
	Mol, Kg      float64
	LeastWaterKg float64 // further water at the same temperature that would dissolve it; NaN not found
	LeastTempK   float64 // temperature that would; NaN not found below 100 °C
}

// PhaseAmount is an amount of one solid.
type PhaseAmount struct {
	Phase   int
	Mol, Kg float64
}

// GasAmount is an amount of gas given off.
type GasAmount struct {
	Gas         int
	Mol         float64
	LitresAt20C float64
}

// Liquor is the content of a tank at one moment.
type Liquor struct {
	Totals  []float64 // mol by component, solution and solids together
	InertKg float64
	TempK   float64
	State   *equilibrium.State
	// Clear is the same liquor with only those solids that were there before
	// the step or were charged in it: saturation indices before anything new
	// comes down. It is State itself when nothing new did.
	Clear     *equilibrium.State
	VolumeL   float64 // with solids and inert matter
	SolutionL float64
	MassKg    float64
	Solids    []PhaseAmount
	// From tells where the totals came from, for "what limits it": kg of each
	// material by name.
	From map[string]float64
}

// FeedLine is the mixing line between feed and bulk.
type FeedLine struct {
	Points []FeedPoint
}

// FeedPoint is one mixture, nothing formed yet.
type FeedPoint struct {
	FeedFraction float64 // volume fraction of feed
	PH, TempK    float64
	Index        []float64 // by phase
}

// Options of a walk.
type Options struct {
	Database *equilibrium.Database // nil: the built-in one
}

// Walk steps the recipe through its tanks. It returns a trace even when it has
// problems, as far as it came.
func Walk(r *recipe.Recipe, o Options) *Trace {
	return walk(r, o, 0).tr
}
