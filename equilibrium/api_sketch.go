package equilibrium

// This file is a sketch of what is coming (bodies follow; signatures hold).

type systemTables struct{}

// NewSystem selects what the named components can form. H^+ and H2O are always
// in. An unknown name is an error.
func (db *Database) NewSystem(components []string) (*System, error) { panic("soon") }

// Solver owns a workspace; not for concurrent use.
type Solver struct{}

// NewSolver returns a Solver for the system.
func (s *System) NewSolver() *Solver { panic("soon") }

// Solve finds the equilibrium of totals (mol by component, H2O and H^+ totals
// included) under the conditions and writes it to out. If out holds an earlier
// state of the same system it is the warm start. It allocates nothing.
func (sv *Solver) Solve(totals []float64, c *Conditions, out *State) error { panic("soon") }

// VolumeL is the volume of the solution at its temperature, without solids.
func (s *System) VolumeL(st *State) float64 { panic("soon") }

// SolutionMassKg is the mass of water and everything dissolved.
func (s *System) SolutionMassKg(st *State) float64 { panic("soon") }

// SolidVolumeL is the volume of the solids.
func (s *System) SolidVolumeL(st *State) float64 { panic("soon") }

// HeatCapacityKJPerK of solution and solids.
func (s *System) HeatCapacityKJPerK(st *State) float64 { panic("soon") }

// IndexUncertainty is u of a saturation index: of the phase's log K at the
// temperature, and of the activity model at the ionic strength.
func (s *System) IndexUncertainty(st *State, phase int) float64 { panic("soon") }

// ModelRange tells whether the state is inside the range of the activity model;
// reason says in words what is outside.
func (s *System) ModelRange(st *State) (inside bool, reason string) { panic("soon") }

// ModelName is the activity model with its range, for screens.
func (s *System) ModelName() string { panic("soon") }

// WaterDensityKgL at tempK, 1 atm.
func WaterDensityKgL(tempK float64) float64 { panic("soon") }
