package equilibrium

import (
	"math"
	"sync"
)

// ionVolume is the table of partial molar volumes at infinite dilution, cm³/mol,
// 25 °C, on the scale V(H^+) = 0.
var ionVolume = sync.OnceValue(func() map[string]float64 {
	table := map[string]float64{}
	err := readTable(tables, "ions.csv", func(r record) error {
		v, err := r.number("v0_cm3_per_mol")
		if err == nil && !math.IsNaN(v) {
			table[r.text("species")] = v
		}
		return err
	})
	if err != nil {
		panic("equilibrium: built-in tables: " + err.Error())
	}
	return table
})

const waterVolumeCm3 = 18.07 // cm³/mol at 25 °C

// ionVolumeL is the volume of a species at infinite dilution in L/mol, and the
// sum of z² that makes it grow with ionic strength: from the table and the
// species' own charge, else the sums over its components (a complex takes about
// the room of its parts, which go on drawing water together less and less as the
// liquor gets stronger; common practice, no source). A component without a value
// counts 0.55 cm³ per g.
func (db *Database) ionVolumeL(s *Species) (volumeL, z2 float64) {
	table := ionVolume()
	if v, ok := table[s.Name]; ok {
		return v / 1000, s.Charge * s.Charge
	}
	sum := 0.0
	for _, p := range s.Parts {
		c := db.component[p.Component]
		z2 += math.Max(p.Coefficient, 0) * c.Charge * c.Charge
		switch v, ok := table[p.Component]; {
		case p.Component == "H2O":
			sum += p.Coefficient * waterVolumeCm3
		case ok:
			sum += p.Coefficient * v
		default:
			sum += p.Coefficient * 0.55 * c.MolarMass
		}
	}
	return sum / 1000, z2
}

// hydroxideVolume is what a mole of hydroxide takes up more for each mol/kg of it,
// L: fitted to the densities of caustic soda and caustic potash of 20 and 50 wt%
// at 20 °C (Perry, Chemical Engineers' Handbook, from memory; calibration).
const hydroxideVolume = 0.4e-3

// VolumeL is the volume of the solution at its temperature, without solids.
//
// Water at its own density (Kell 1975) plus ions, V_i = V°_i + ½ S_V z_i² √I with
// the limiting slope S_V = 1.868 cm³ L^½ mol^-3/2 (Redlich and Meyer 1964, Chem.
// Rev. 64, 221), and a term of our own for hydroxide. Good to about 1 % at
// 1 mol/kg, 3 % in strong liquors.
func (s *System) VolumeL(st *State) float64 {
	half := 0.5 * 1.868e-3 * math.Sqrt(math.Min(st.IonicStrength, 20))
	sum := 0.0
	for i, m := range st.Molality {
		sum += m * (s.volume[i] + half*s.volumeZ2[i])
	}
	if s.hydroxide >= 0 {
		m := st.Molality[s.hydroxide]
		sum += hydroxideVolume * m * math.Min(m, 25)
	}
	return st.WaterKg * (1/WaterDensityKgL(st.TempK) + sum)
}

// SolutionMassKg is the mass of water and everything dissolved.
func (s *System) SolutionMassKg(st *State) float64 {
	sum := 0.0
	for i, m := range st.Molality {
		sum += m * s.speciesMassKg(i)
	}
	return st.WaterKg * (1 + sum)
}

func (s *System) speciesMassKg(i int) float64 {
	mass := s.speciesWater[i] * s.Components[water].MolarMass
	for k := s.species.start[i]; k < s.species.start[i+1]; k++ {
		mass += s.species.coefficient[k] * s.Components[s.species.component[k]].MolarMass
	}
	return mass / 1000
}

// SolidVolumeL is the volume of the solids; a phase without a known density
// counts 2.2 kg/L (common practice, no source).
func (s *System) SolidVolumeL(st *State) float64 {
	sum := 0.0
	for i, n := range st.SolidMol {
		if n > 0 {
			density := s.Phases[i].DensityKgL
			if math.IsNaN(density) || density <= 0 {
				density = 2.2
			}
			sum += n * s.Phases[i].MolarMass / 1000 / density
		}
	}
	return sum
}

// SolidMassKg is the mass of the solids.
func (s *System) SolidMassKg(st *State) float64 {
	sum := 0.0
	for i, n := range st.SolidMol {
		sum += n * s.Phases[i].MolarMass / 1000
	}
	return sum
}

// HeatCapacityKJPerK of solution and solids: water alone carries the solution's
// (4.18 kJ/(kg K); what ions take from it and add to it nearly cancels up to
// saturation, within 6 % for sodium chloride), solids 0.9 kJ/(kg K). Common
// practice, no source.
func (s *System) HeatCapacityKJPerK(st *State) float64 {
	return 4.18*st.WaterKg + 0.9*s.SolidMassKg(st)
}
