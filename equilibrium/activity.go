package equilibrium

import "math"

// Activity coefficients: extended Debye-Hückel with specific ion interaction
// terms (Brønsted, Guggenheim, Scatchard, Ciavatta 1980; the form of the NEA
// Chemical Thermodynamics series, Appendix B), with explicit ion pairs for what
// associates more strongly than a coefficient can say:
//
//	ln γ_i = −z_i² D(I) + ln 10 Σ_j ε_ij m_j      D = 3 Aφ √I / (1 + 1.5 √I)
//
// ε are taken as constant in temperature. From them follows, by Gibbs-Duhem,
//
//	Σm (φ − 1) = −(2·3Aφ/1.5³)[1 + 1.5√I − 2 ln(1 + 1.5√I) − 1/(1 + 1.5√I)]
//	             + ln 10 Σ_{pairs} ε_ij m_i m_j
//
// The model is made for I up to about 3 mol/kg. Above sitLimit the interaction
// energy is multiplied by s(I) = (I₀/I)(1 + ln(I/I₀)), so that it goes on with
// the logarithm of I instead of linearly: a continuation of our own, with no
// source, that keeps the solution stable where negative ε would make it part
// into two liquids. States there are reported as outside the range.
const (
	sitDenominator = 1.5 // kg^0.5 mol^-0.5, SIT convention
	sitLimit       = 3.0 // mol/kg
	traceMolality  = 1e-13
)

// sitEstimate is ε for a cation and an anion without a published value: the
// middle of the published ones of that charge type. Common practice, no source.
// Multiply charged ions of both signs get zero: their association is explicit.
func sitEstimate(cationCharge, anionCharge float64) float64 {
	switch c, a := int(cationCharge), int(-anionCharge); {
	case c == 1 && a == 1:
		return 0.02
	case c == 2 && a == 1:
		return 0.15
	case c >= 3 && a == 1:
		return 0.3
	case c == 1 && a == 2:
		return -0.08
	case c == 1 && a >= 3:
		return -0.15
	}
	return 0
}

// setschenow holds k_s (log10 γ = k_s I) of dissolved gases and uncharged acids;
// other neutral species have 0.
// CO2: 0.10 in NaCl, Harned and Davis 1943, J. Am. Chem. Soc. 65, 2030 (from
// memory). The others: Long and McDevit 1952, Chem. Rev. 51, 119 (from memory),
// NaCl; silicic acid: Marshall and Chen 1982, Geochim. Cosmochim. Acta 46, 289
// (from memory).
var setschenow = map[string]float64{
	"CO2(aq)": 0.10, "H2S(aq)": 0.08, "NH3(aq)": 0.03, "SO2(aq)": 0.05, "HCN(aq)": 0.03,
	"H4SiO4(aq)": 0.08, "HAcetate(aq)": 0.07, "HBenzoate(aq)": 0.18,
}

// interactions is the table of ε in the order of a System: cations by rows,
// anions by columns.
type interactions struct {
	cations, anions []int     // species indices
	epsilon         []float64 // [cation*len(anions)+anion]
	estimated       []bool
	neutral         []int     // species with a Setschenow coefficient
	neutralK        []float64 // k_s/2 per z²
}

func newInteractions(db *Database, species []*Species) interactions {
	var t interactions
	known := make(map[[2]string]float64, len(db.Interactions))
	for _, p := range db.Interactions {
		known[[2]string{p.Cation, p.Anion}] = p.Epsilon
	}
	for i, s := range species {
		switch {
		case s.Charge > 0:
			t.cations = append(t.cations, i)
		case s.Charge < 0:
			t.anions = append(t.anions, i)
		default:
			if k, ok := setschenow[s.Name]; ok {
				t.neutral = append(t.neutral, i)
				t.neutralK = append(t.neutralK, k/2)
			}
		}
	}
	for _, c := range t.cations {
		for _, a := range t.anions {
			e, ok := known[[2]string{species[c].Name, species[a].Name}]
			if !ok {
				e = sitEstimate(species[c].Charge, species[a].Charge)
			}
			t.epsilon = append(t.epsilon, e)
			t.estimated = append(t.estimated, !ok && e != 0)
		}
	}
	return t
}

// activity evaluates ln γ of every species and ln a_w from molalities; scratch has
// room for twice the species.
func (t *interactions) activity(aphi float64, charge, molality, lnGamma, scratch []float64) (ionicStrength, lnWater, sumMolality float64) {
	ionic, total := 0.0, 0.0
	for i, m := range molality {
		ionic += m * charge[i] * charge[i]
		total += m
	}
	ionic /= 2
	root := math.Sqrt(ionic)
	den := 1 + sitDenominator*root
	slope := 3 * aphi
	debye := slope * root / den
	s, ds := 1.0, 0.0
	if ionic > sitLimit {
		l := math.Log(ionic / sitLimit)
		s = sitLimit / ionic * (1 + l)
		ds = -sitLimit * l / (ionic * ionic)
	}
	// Σ_j ε_ij m_j into lnGamma, then the rest.
	for i := range lnGamma {
		lnGamma[i] = 0
	}
	// The anions' molalities and sums stand one behind the other in scratch.
	na := len(t.anions)
	anions, sums := scratch[:na], scratch[na:2*na]
	for ia, a := range t.anions {
		anions[ia], sums[ia] = molality[a], 0
	}
	for ic, c := range t.cations {
		row := t.epsilon[ic*na : ic*na+na]
		mc, sum := molality[c], 0.0
		if mc < traceMolality {
			sum = dot(row, anions)
		} else {
			for ia, e := range row {
				sum += e * anions[ia]
				sums[ia] += e * mc
			}
		}
		lnGamma[c] = sum
	}
	for ia, a := range t.anions {
		lnGamma[a] = sums[ia]
	}
	pairs := 0.0 // Σ_{pairs} ε m m
	for _, c := range t.cations {
		pairs += molality[c] * lnGamma[c]
	}
	neutral := 0.0 // Σ k_N m_N: acts on every ion by z²
	for n, i := range t.neutral {
		k := t.neutralK[n]
		neutral += k * molality[i]
		lnGamma[i] = 2 * k * ionic
	}
	pairs += 2 * neutral * ionic
	for i := range lnGamma {
		z2 := charge[i] * charge[i]
		lnGamma[i] = -z2*debye + ln10*(s*(lnGamma[i]+z2*neutral)+0.5*z2*ds*pairs)
	}
	excess := -2*slope/(sitDenominator*sitDenominator*sitDenominator)*(den-2*math.Log(den)-1/den) +
		ln10*pairs*(s+ionic*ds)
	lnWater = -waterMolarMass * (total + excess)
	return ionic, math.Max(lnWater, -4), total
}
