package equilibrium

// System is the part of a database that a set of components can form, with its
// index tables. It is not changed after it is made and may be shared between
// goroutines; each needs a Solver of its own.
type System struct {
	Database   *Database
	Components []*Component
	Species    []*Species
	Phases     []*Phase
	Gases      []*Gas

	index    map[string]int
	internal systemTables
}

// Index returns the place of a component, or -1.
func (s *System) Index(component string) int {
	if i, ok := s.index[component]; ok {
		return i
	}
	return -1
}

// NewState returns a State with slices of the right lengths.
func (s *System) NewState() *State {
	return &State{
		LnActivity: make([]float64, len(s.Components)),
		Molality:   make([]float64, len(s.Species)),
		LnGamma:    make([]float64, len(s.Species)),
		SolidMol:   make([]float64, len(s.Phases)),
		Index:      make([]float64, len(s.Phases)),
		GasBar:     make([]float64, len(s.Gases)),
		GasInMol:   make([]float64, len(s.Gases)),
	}
}

// Ready fills allowed with the phases that may form at tempK in process time.
func (s *System) Ready(tempK float64, allowed []bool) {
	for i, p := range s.Phases {
		allowed[i] = p.Forms == FormsFast || p.Forms == FormsHot && tempK-ZeroCelsius >= p.FormsAboveC
	}
}
