package equilibrium

import (
	"fmt"
	"math"
	"sort"
)

// System is the part of a database that a set of components can form, with its
// index tables. It is not changed after it is made and may be shared between
// goroutines; each needs a Solver of its own.
type System struct {
	Database   *Database
	Components []*Component // H2O first, then H^+, then the others by name
	Species    []*Species
	Phases     []*Phase
	Gases      []*Gas

	index        map[string]int
	charge       []float64 // by species
	species      sparse    // formation, without water
	speciesWater []float64
	phases       sparse // dissolution, without water
	phaseWater   []float64
	gasSpecies   []int
	interactions interactions
	volume       []float64 // infinite dilution, L/mol by species
	volumeZ2     []float64 // charges that draw water together, see VolumeL
	hydroxide    int       // species index of OH^-, -1 when absent
}

// The first components of every System.
const (
	water  = 0
	proton = 1
)

// sparse holds rows of (component, coefficient) one behind the other.
type sparse struct {
	start       []int32
	component   []int32
	coefficient []float64
}

func (s *sparse) add(parts []Part, index map[string]int) (waterCoefficient float64) {
	if len(s.start) == 0 {
		s.start = append(s.start, 0)
	}
	for _, p := range parts {
		c := index[p.Component]
		if c == water {
			waterCoefficient += p.Coefficient
			continue
		}
		s.component = append(s.component, int32(c))
		s.coefficient = append(s.coefficient, p.Coefficient)
	}
	s.start = append(s.start, int32(len(s.component)))
	return waterCoefficient
}

// dot is Σ ν λ over row i.
func (s *sparse) dot(i int, lambda []float64) float64 {
	sum := 0.0
	for k := s.start[i]; k < s.start[i+1]; k++ {
		sum += s.coefficient[k] * lambda[s.component[k]]
	}
	return sum
}

// NewSystem selects what the named components can form. H^+ and H2O are always
// in. An unknown name is an error.
func (db *Database) NewSystem(components []string) (*System, error) {
	s := &System{Database: db, index: map[string]int{}, hydroxide: -1}
	names := []string{"H2O", "H^+"}
	rest := append([]string{}, components...)
	sort.Strings(rest)
	for _, name := range rest {
		if name != "H2O" && name != "H^+" {
			names = append(names, name)
		}
	}
	for _, name := range names {
		c, ok := db.component[name]
		if !ok {
			return nil, fmt.Errorf("%q is not a component of the tables", name)
		}
		if _, twice := s.index[name]; twice {
			continue
		}
		s.index[name] = len(s.Components)
		s.Components = append(s.Components, c)
	}
	for _, sp := range db.Species {
		if !s.has(sp.Parts) {
			continue
		}
		if sp.Name == "OH^-" {
			s.hydroxide = len(s.Species)
		}
		s.Species = append(s.Species, sp)
		s.charge = append(s.charge, sp.Charge)
		s.speciesWater = append(s.speciesWater, s.species.add(sp.Parts, s.index))
		volume, z2 := db.ionVolumeL(sp)
		s.volume, s.volumeZ2 = append(s.volume, volume), append(s.volumeZ2, z2)
	}
	for _, p := range db.Phases {
		if s.has(p.Parts) {
			s.Phases = append(s.Phases, p)
			s.phaseWater = append(s.phaseWater, s.phases.add(p.Parts, s.index))
		}
	}
	for _, g := range db.Gases {
		for i, sp := range s.Species {
			if sp.Name == g.Species {
				s.Gases = append(s.Gases, g)
				s.gasSpecies = append(s.gasSpecies, i)
			}
		}
	}
	s.interactions = newInteractions(db, s.Species)
	return s, nil
}

func (s *System) has(parts []Part) bool {
	for _, p := range parts {
		if _, ok := s.index[p.Component]; !ok {
			return false
		}
	}
	return true
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

// CopyFrom makes s the same as other, for a warm start that leaves other as it
// is. Both belong to one System.
func (s *State) CopyFrom(other *State) {
	la, mo, ga, so, ix, gb, gi := s.LnActivity, s.Molality, s.LnGamma, s.SolidMol, s.Index, s.GasBar, s.GasInMol
	*s = *other
	s.LnActivity = append(la[:0], other.LnActivity...)
	s.Molality = append(mo[:0], other.Molality...)
	s.LnGamma = append(ga[:0], other.LnGamma...)
	s.SolidMol = append(so[:0], other.SolidMol...)
	s.Index = append(ix[:0], other.Index...)
	s.GasBar = append(gb[:0], other.GasBar...)
	s.GasInMol = append(gi[:0], other.GasInMol...)
}

// Ready fills allowed with the phases that may form at tempK in process time.
func (s *System) Ready(tempK float64, allowed []bool) {
	for i, p := range s.Phases {
		allowed[i] = p.Forms == FormsFast || p.Forms == FormsHot && tempK-ZeroCelsius >= p.FormsAboveC
	}
}

// PhaseIndex returns the place of a phase by name, or -1.
func (s *System) PhaseIndex(name string) int {
	for i, p := range s.Phases {
		if p.Name == name {
			return i
		}
	}
	return -1
}

// ModelName is the activity model with its range, for screens.
func (s *System) ModelName() string {
	return "extended Debye-Hückel with specific ion interaction, ionic strength to 3 mol/kg"
}

// ModelRange tells whether the state is inside the range of the activity model;
// reason says in words what is outside.
func (s *System) ModelRange(st *State) (inside bool, reason string) {
	c := st.TempK - ZeroCelsius
	switch {
	case st.IonicStrength > sitLimit:
		return false, fmt.Sprintf("ionic strength %.1f mol/kg, the model is made for up to %.0f", st.IonicStrength, sitLimit)
	case c < -0.5 || c > 100.5:
		return false, fmt.Sprintf("%.0f °C, the data are for 0 to 100 °C", c)
	case st.IonicStrength > 1 && (c < 5 || c > 60):
		return false, fmt.Sprintf("%.0f °C at ionic strength %.1f mol/kg, the interaction coefficients are for about 25 °C", c, st.IonicStrength)
	}
	return true, ""
}

// EstimatedInteraction names the pair of ions with the most weight whose
// interaction is estimated by charge type; weight is ln 10 · ε · m of the rarer
// ion's partner, that is the part of ln γ resting on it.
func (s *System) EstimatedInteraction(st *State) (cation, anion string, weight float64) {
	t := &s.interactions
	for ic, c := range t.cations {
		for ia, a := range t.anions {
			k := ic*len(t.anions) + ia
			if !t.estimated[k] {
				continue
			}
			w := ln10 * math.Abs(t.epsilon[k]) * math.Min(st.Molality[c], st.Molality[a])
			if w > weight {
				cation, anion, weight = s.Species[c].Name, s.Species[a].Name, w
			}
		}
	}
	return cation, anion, weight
}

// IndexUncertainty is u of a saturation index: of the phase's log K at the
// temperature, and of the activity model. The model part is 0.01 at infinite
// dilution and grows with ionic strength and with the charges that the phase
// brings; past the limit it grows faster. Common practice, no source.
func (s *System) IndexUncertainty(st *State, phase int) float64 {
	z2 := 0.0
	for _, p := range s.Phases[phase].Parts {
		if c, ok := s.index[p.Component]; ok {
			z := s.Components[c].Charge
			z2 += math.Abs(p.Coefficient) * z * z
		}
	}
	ionic := st.IonicStrength
	model := 0.01 + 0.01*math.Sqrt(z2)*math.Sqrt(ionic)
	if ionic > sitLimit {
		model += 0.06 * math.Sqrt(z2) * (ionic - sitLimit)
	}
	return math.Hypot(s.Phases[phase].LogK.UncertaintyAt(st.TempK), model)
}
