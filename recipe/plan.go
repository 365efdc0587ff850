package recipe

// Dimension is what a quantity measures. Values are held in the unit named.
type Dimension int

const (
	_             Dimension = iota
	Number                  // plain number (pH)
	Mass                    // kg
	Volume                  // L
	Amount                  // mol
	MassFraction            // kg per kg of the whole (wt%, ppm = mg/kg)
	MassPerVolume           // kg per L (g/L, mg/L)
	MolPerVolume            // mol per L
	Molality                // mol per kg of water
	EqPerVolume             // equivalents per L
	Temperature             // K
	Duration                // s
	Pressure                // Pa
	Length                  // m
	Density                 // kg per L
)

// Quantity is a value with its tolerance and its place.
type Quantity struct {
	Value       float64 // in the unit of the dimension
	Minus, Plus float64 // how far it may fall short or exceed, same unit, >= 0
	Dimension   Dimension
	As          string // "CaCO3" of "mg/L as CaCO3"; "" when not given
	PerBatch    bool   // was written per batch size ("96 g/L" as a mass) and has been multiplied out
	Text        string // as written
	At          Range
}

// Content is one line of a water's or material's contents.
type Content struct {
	What   string // as written: Ca, SO4, NaOH, alkalinity, SiO2
	Amount Quantity
	At     Range // of the name
}

// Recipe is a file read, checked and resolved: parameters replaced, batch
// amounts multiplied out, stock files merged.
type Recipe struct {
	Name       string
	File       string
	At         Range
	Revision   string
	Batch      *Quantity // Volume or Mass
	Repeat     int       // 1 unless said otherwise
	Uses       []string  // stock files, in the order read
	Rules      []string
	Inputs     []Input // every file that was read, this one first
	Parameters []*Parameter
	Waters     []*Water
	Materials  []*Material
	Liquors    []*LiquorFrom
	Phases     []*OwnPhase
	Complexes  []*OwnComplex
	Tanks      []*Tank
	Stages     []*Stage
	Waivers    []*Waiver // at recipe level
}

// Input is a file that was read.
type Input struct {
	Path   string
	SHA256 string
}

// Parameter may be overridden by --set.
type Parameter struct {
	Name, Value string
	Overridden  bool
	At          Range
}

// Water is a make-up water given by its analysis.
type Water struct {
	Name        string
	Temperature *Quantity // nil: 20 °C is assumed and said
	PH          *Quantity
	Contents    []Content // ions by mg/L and so on; alkalinity, hardness as written
	At          Range
	FromStock   bool
	Used        bool
}

// Material is a charge described in the recipe or a stock file. It overrides the
// catalogue's substance of the same name.
type Material struct {
	Name         string
	Formula      string // "" when contents are given
	FormulaAt    Range
	Contents     []Content // the rest is water
	Assay        *Quantity
	Density      *Quantity
	ParticleSize *Quantity
	Temperature  *Quantity // as charged; nil: 20 °C
	Form         string    // powder, granules, flakes, solution, gas; "" unknown
	Inert        bool
	At           Range
	FromStock    bool
	Used         bool
}

// LiquorFrom is liquor taken from a tank at the end of another recipe.
type LiquorFrom struct {
	Name   string
	From   string // path as written
	Recipe *Recipe
	Tank   string
	At     Range
	Used   bool
}

// OwnPhase and OwnComplex are the site's own data.
type OwnPhase struct {
	Name, Formula, Reaction string
	Log10K25C               float64
	EnthalpyKJ              *float64
	Table                   []TempPoint // log10 K against temperature, instead of an enthalpy
	Uncertainty             float64
	Forms                   string // fast, slow
	Source                  string
	At                      Range
	FromStock               bool
}

// OwnComplex is a dissolved species of the site's own.
type OwnComplex struct {
	Name, Reaction string
	Log10K25C      float64
	EnthalpyKJ     *float64
	Table          []TempPoint
	Uncertainty    float64
	Source         string
	At             Range
	FromStock      bool
}

// TempPoint is one point of a table against temperature.
type TempPoint struct{ TempK, Log10K float64 }

// Headspace is what stands above the liquor.
type Headspace struct {
	Kind      string             // air, closed, nitrogen, given
	PartialPa map[string]float64 // for given
	At        Range
}

// Tank is a vessel.
type Tank struct {
	Name                  string
	Capacity              *Quantity
	LeastFill             *Quantity
	Headspace             Headspace // Kind "air" when not given
	RatingLow, RatingHigh *Quantity
	Coldest               *Quantity
	Heel                  *Step  // a charge before the first stage, nil: starts empty
	Material              string // what it is built of, free text
	At                    Range
	FromStock             bool
	Used                  bool
}

// Stage is a named part of the batch.
type Stage struct {
	Name    string
	Tank    *Tank // default for its steps, may be nil
	Steps   []*Step
	Waivers []*Waiver
	At      Range
}

// StepKind names a step. The zero value is not valid.
type StepKind int

const (
	_ StepKind = iota
	Charge
	Dose
	Heat
	Cool
	Hold
	Age
	Adjust
	MakeUp
	Evaporate
	Sparge
	Transfer
	Decant
	Filter
	Seed
	Sample
	Together
	Expect // a planned solid, declared among the steps
)

// StepKindName gives the word used in files.
var StepKindName = [...]string{"", "charge", "dose", "heat", "cool", "hold", "age", "adjust", "make_up", "evaporate", "sparge", "transfer", "decant", "filter", "seed", "sample", "together", "expect"}

func (k StepKind) String() string { return StepKindName[k] }

// Step is one thing done. Which fields are set follows from Kind; the others are
// nil or zero.
type Step struct {
	Kind   StepKind
	What   string // label: material, water, liquor, phase or gas name; "" when the kind has none
	WhatAt Range
	Tank   *Tank // where; never nil after reading
	At     Range // the block's type and label, what a finding points at
	Stage  *Stage

	Amount      *Quantity // charge, dose, seed: Mass, Volume or Amount
	Over        *Quantity // dose, transfer, heat, cool, together: Duration
	For         *Quantity // hold, age, sparge
	To          *Quantity // heat, cool: Temperature; make_up, evaporate: Volume or Mass
	ReadAt      *Quantity // adjust, sample, make_up: temperature at which pH or volume is read
	Temperature *Quantity // of the charge itself, when it differs from the material's
	Water       *Quantity // evaporate: Mass or Volume of water taken off
	PH          *Quantity // adjust: target
	With        string    // adjust: material
	WithAt      Range
	AtMost      *Quantity // adjust: Mass or Volume
	Gas         string    // sparge
	Pressure    *Quantity // sparge
	Into        *Tank     // transfer, decant, filter: where the liquor goes
	Volume      *Quantity // transfer, decant
	All         bool      // transfer: everything
	Clear       bool      // transfer: liquor without solids
	Moisture    *Quantity // filter: MassFraction of liquor in the wet cake
	WashWith    string    // filter
	Wash        *Quantity // filter: Volume or Mass of wash
	Limits      []Limit   // sample
	AtLeast     *Quantity // expect: Mass, or MassFraction of what could form ("80 %")
	Doses       []*Step   // together
	Waivers     []*Waiver
}

// Limit is one acceptance limit of a sample.
type Limit struct {
	What      string    // ph, temperature, density, volume, an ion or element ("F", "Ca"), solids
	Low, High *Quantity // nil: open
	At        Range
}

// Waiver accepts a finding, with the reason.
type Waiver struct {
	Code      string
	Phase     string // "" any
	Because   string
	Until     string // 2027-06-30, "" for ever
	Reference string
	At        Range
	Used      bool
	Expired   bool // Until has passed: it waives nothing
}
