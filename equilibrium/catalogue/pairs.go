package catalogue

import (
	"math"
	"slices"
)

// Pair is two hazard classes that must not meet unawares.
type Pair struct {
	A, B    string  // classes; see [Classes]
	Ordered bool    // only when A goes into B; otherwise whichever comes first
	AboveC  float64 // only at this temperature of the mix or above; NaN: at any
	Gives   string  // what comes of it
	Caution string  // the usual care, in a sentence
	Source  string
}

// The pairs are common knowledge of laboratories and plants, from memory of the
// works named; none was re-read. They are reminders, not a hazard study.
const (
	prudent  = "National Research Council, Prudent Practices in the Laboratory (2011), incompatible chemicals; from memory"
	reactive = "Urben (ed.), Bretherick's Handbook of Reactive Chemical Hazards, 7th ed. 2007; from memory"
	practice = "common practice, no source"
)

var anyC = math.NaN()

var pairs = []Pair{
	{"acid", "cyanide", false, anyC, "hydrogen cyanide", "Never acidify cyanide: keep the liquor above pH 10.5 and the acid in another room.", prudent},
	{"acid", "sulfide", false, anyC, "hydrogen sulfide", "Keep sulfide liquors alkaline; hydrogen sulfide dulls the sense of smell before it kills.", prudent},
	{"acid", "hypochlorite", false, anyC, "chlorine", "Never let acid into hypochlorite, nor both into one drain or scrubber.", prudent},
	{"acid", "sulfite", false, anyC, "sulfur dioxide", "Exhaust the vessel and acidify slowly.", prudent},
	{"acid", "thiosulfate", false, anyC, "sulfur dioxide and sulfur", "Exhaust the vessel; sulfur clouds the liquor and blocks filters.", practice},
	{"acid", "azide", false, anyC, "hydrogen azide, toxic and explosive", "Never acidify azide.", prudent},
	{"acid", "fluoride", false, anyC, "hydrogen fluoride in the liquor and above it", "Wear what hydrofluoric acid calls for, with calcium gluconate gel at hand; keep glass away.", prudent},
	{"acid", "carbonate", false, anyC, "carbon dioxide", "Add slowly, with freeboard for the foam and an open vent; carbon dioxide gathers in pits and tanks.", practice},
	{"acid", "nitrite", false, anyC, "nitrogen oxides", "Exhaust the vessel and acidify slowly, in the cold.", prudent},
	{"acid", "chlorite", false, anyC, "chlorine dioxide, explosive above about 10 % in air", "Only in a generator made for it.", prudent},
	{"strong acid", "chlorate", false, anyC, "chlorine dioxide, explosive", "Keep chlorate away from acids.", prudent},
	{"strong acid", "permanganate", false, anyC, "with concentrated sulfuric acid explosive manganese heptoxide, with chloride chlorine", "Add permanganate only to dilute acid.", reactive},
	{"strong acid", "thiocyanate", false, anyC, "toxic gases (carbonyl sulfide, hydrogen cyanide)", "Keep thiocyanate away from strong acid.", reactive},
	{"strong acid", "reactive metal", false, anyC, "hydrogen", "No sparks, open vent, slow addition.", prudent},
	{"acid", "reactive metal", false, anyC, "hydrogen", "No sparks, open vent.", practice},
	{"strong acid", "caustic solid", false, anyC, "violent heat, spattering", "Dissolve the alkali first.", practice},

	{"water", "concentrated sulfuric acid", true, anyC, "boiling and spattering of acid", "Always the acid into the water, slowly, stirred and cooled; never water into the acid.", prudent},
	{"water", "quicklime", true, anyC, "boiling lime", "Lime into water, in a slaker made for it.", practice},
	{"caustic solid", "water", true, 40, "boiling and spattering of caustic", "Start with cold water, add the solid slowly and stirred; never into warm or hot water.", practice},
	{"water", "caustic solid", true, anyC, "a hot cake that boils and spatters", "Always the solid into the water.", practice},
	{"quicklime", "water", true, 60, "boiling lime", "Slake in equipment that vents the steam.", practice},
	{"water", "water reactive", false, anyC, "violent heat, acid or burning gas", "Add little by little to much cold water where the safety data sheet allows it at all.", prudent},

	{"hypochlorite", "ammonia", false, anyC, "chloramines, with little ammonia explosive nitrogen trichloride", "Never combine; separate lines, bunds and drains.", prudent},
	{"hypochlorite", "ammonium salt", false, anyC, "chloramines", "Only where breakpoint chlorination is planned and ventilated.", prudent},
	{"hypochlorite", "amine", false, anyC, "chloramines", "Never combine concentrates.", prudent},
	{"hypochlorite", "organic", false, anyC, "heat, chlorinated vapours, fire", "Never combine concentrates.", prudent},
	{"hypochlorite", "peroxide", false, anyC, "oxygen, vigorously", "Only dilute, vented, as a planned dechlorination.", reactive},
	{"hypochlorite", "sulfite", false, anyC, "much heat", "Dechlorinate dilute liquors only.", practice},
	{"hypochlorite", "thiosulfate", false, anyC, "much heat", "Dechlorinate dilute liquors only.", practice},
	{"hypochlorite", "cyanide", false, anyC, "below about pH 10 cyanogen chloride", "Destroy cyanide at pH 10.5 or above only.", practice},
	{"hypochlorite", "nickel", false, anyC, "oxygen: nickel decomposes hypochlorite", "Never in a closed vessel.", practice},
	{"hypochlorite", "cobalt", false, anyC, "oxygen: cobalt decomposes hypochlorite", "Never in a closed vessel.", practice},
	{"hypochlorite", "copper", false, anyC, "oxygen: copper decomposes hypochlorite", "Never in a closed vessel.", practice},
	{"hypochlorite", "reducer", false, anyC, "much heat and gas", "Never combine concentrates.", reactive},
	{"chlorine", "ammonia", false, anyC, "nitrogen trichloride, explosive", "Never combine.", prudent},
	{"chlorine", "organic", false, anyC, "fire, chlorinated vapours", "Keep apart.", prudent},

	{"strong base", "ammonium salt", false, anyC, "ammonia", "Exhaust the vessel; dose slowly and cool.", prudent},
	{"caustic solid", "ammonium salt", false, anyC, "ammonia, at once and much of it", "Exhaust the vessel; dissolve each first.", prudent},
	{"quicklime", "ammonium salt", false, anyC, "ammonia", "Exhaust the vessel.", practice},
	{"strong base", "reactive metal", false, anyC, "hydrogen", "No sparks, open vent; no aluminium or galvanised fittings.", prudent},
	{"caustic solid", "reactive metal", false, anyC, "hydrogen and heat", "No sparks, open vent.", prudent},
	{"strong base", "peroxide", false, anyC, "oxygen: alkali decomposes peroxide", "Dilute and cold only, never closed in.", prudent},

	{"silver", "ammonia", false, anyC, "on standing explosive silver nitride", "Use at once, never store, acidify what is left over.", reactive},
	{"silver", "azide", false, anyC, "explosive silver azide", "Never combine.", reactive},
	{"lead", "azide", false, anyC, "explosive lead azide", "Never combine; mind lead and copper pipes.", reactive},
	{"copper", "azide", false, anyC, "explosive copper azide", "Never combine; mind copper pipes.", reactive},

	{"organic", "nitric acid", true, anyC, "fire or explosion with the strong acid, nitrogen oxides, at times after a delay", "Keep organics out of strong nitric acid; never close the vessel.", prudent},
	{"nitric acid", "solvent", false, anyC, "fire or explosion, nitrogen oxides, at times after a delay", "Keep solvents out of nitric acid; never close the vessel.", prudent},
	{"nitric acid", "flammable", false, anyC, "fire or explosion, at times after a delay", "Never combine.", prudent},
	{"nitric acid", "reactive metal", false, anyC, "nitrogen oxides, hydrogen", "Exhaust the vessel.", prudent},
	{"nitric acid", "copper", false, anyC, "with the metal nitrogen oxides", "Exhaust the vessel when metal is there.", practice},
	{"nitric acid", "reducer", false, anyC, "fire, nitrogen oxides", "Never combine concentrates.", prudent},
	{"nitric acid", "sulfite", false, anyC, "nitrogen oxides and sulfur dioxide", "Exhaust the vessel.", practice},
	{"nitric acid", "ammonium salt", false, anyC, "ammonium nitrate: explosive when dried out or contaminated", "Never let such liquor evaporate to dryness.", practice},
	{"organic", "concentrated sulfuric acid", true, anyC, "charring, heat, gas", "Dilute the acid first.", prudent},
	{"concentrated sulfuric acid", "solvent", false, anyC, "charring, heat, gas", "Dilute the acid first.", prudent},
	{"concentrated sulfuric acid", "flammable", false, anyC, "heat, ignition", "Never combine.", prudent},
	{"chloride", "concentrated sulfuric acid", true, anyC, "hydrogen chloride", "Dilute the acid first; exhaust the vessel.", practice},
	{"bromide", "concentrated sulfuric acid", true, anyC, "hydrogen bromide, bromine", "Dilute the acid first.", practice},
	{"iodide", "concentrated sulfuric acid", true, anyC, "iodine, hydrogen sulfide", "Dilute the acid first.", practice},
	{"nitrate", "concentrated sulfuric acid", true, anyC, "nitric acid and its vapours", "Dilute the acid first; exhaust the vessel.", practice},
	{"concentrated sulfuric acid", "peroxide", false, anyC, "peroxomonosulfuric acid, explosive with organics", "Never above the strength that the site has approved.", reactive},
	{"concentrated sulfuric acid", "perchlorate", false, anyC, "anhydrous perchloric acid, explosive", "Never combine.", prudent},

	{"peroxide", "organic", false, anyC, "fire or explosion with concentrates", "Keep concentrates apart; never close the vessel.", prudent},
	{"peroxide", "flammable", false, anyC, "explosive mixtures", "Never combine.", prudent},
	{"peroxide", "iron", false, anyC, "oxygen and heat, radicals: runaway in closed vessels", "Dose the peroxide slowly under cooling, at pH 3 to 5, vented.", practice},
	{"peroxide", "copper", false, anyC, "oxygen and heat", "Dose slowly, vented.", practice},
	{"peroxide", "silver", false, anyC, "oxygen and heat", "Keep apart.", practice},
	{"peroxide", "lead", false, anyC, "oxygen and heat", "Keep apart.", practice},
	{"peroxide", "permanganate", false, anyC, "oxygen, vigorously", "Never combine concentrates.", reactive},
	{"peroxide", "reducer", false, anyC, "much heat and gas", "Never combine concentrates.", reactive},
	{"peroxide", "sulfide", false, anyC, "heat, sulfur", "Dose slowly; keep alkaline.", practice},

	{"oxidiser", "organic", false, anyC, "heat, fire when dry", "Keep dry concentrates apart; rinse spills away.", prudent},
	{"oxidiser", "flammable", false, anyC, "fire", "Never combine.", prudent},
	{"oxidiser", "reducer", false, anyC, "much heat and gas", "Never combine concentrates.", prudent},
	{"oxidiser", "sulfide", false, anyC, "heat, sulfur", "Dose slowly.", practice},
	{"oxidiser", "reactive metal", false, anyC, "fire when dry", "Keep apart.", prudent},
	{"oxidiser", "iodide", false, anyC, "iodine", "Exhaust the vessel.", practice},
	{"oxidiser", "thiocyanate", false, anyC, "toxic gases", "Keep apart.", reactive},
	{"oxidiser", "cyanide", false, anyC, "heat; explosive when dry", "Keep apart, save in a planned destruction at high pH.", prudent},
	{"chlorate", "organic", false, anyC, "fire or explosion when dry", "Never let residues dry on clothes, wood or paper.", prudent},
	{"chlorate", "ammonium salt", false, anyC, "ammonium chlorate, explosive", "Never combine.", prudent},
	{"chlorate", "sulfite", false, anyC, "heat, chlorine dioxide in acid", "Keep apart.", practice},
	{"permanganate", "solvent", false, anyC, "fire", "Never combine the solid with solvents.", prudent},
	{"permanganate", "organic", false, anyC, "fire with glycerol and glycols", "Never combine the solid with organics.", prudent},
	{"permanganate", "ammonium salt", false, anyC, "ammonium permanganate, explosive when dry", "Never let it dry.", reactive},
	{"permanganate", "chloride", false, anyC, "chlorine, in acid", "Exhaust the vessel when acid is there.", practice},
	{"chromate", "organic", false, anyC, "heat, fire with the solid", "Keep concentrates apart; chromium(VI) causes cancer.", prudent},
	{"nitrite", "ammonium salt", false, anyC, "nitrogen and heat; ammonium nitrite decomposes explosively when hot or dry", "Cold, dilute, vented only.", prudent},
	{"nitrite", "amine", false, anyC, "nitrosamines, which cause cancer", "Never in one formulation.", practice},
	{"nitrite", "reducer", false, anyC, "heat and gas", "Keep apart.", reactive},
	{"nitrite", "cyanide", false, anyC, "explosion when heated or dry", "Never combine.", reactive},
}

// Pairs returns the table, in a fixed order.
func Pairs() []Pair { return slices.Clone(pairs) }

// Clashes returns the pairs of a substance that goes into another, by their
// classes, at a temperature of the mix, °C. Of pairs that give the same only the
// first is returned, and salts of one acid are no pair with it (bisulfite with
// sulfite).
//
// The classes of what is in a tank are for the caller to tell, by its state: a
// water or dilute liquor is of the class "water", and one to which strong acid was
// added is no "concentrated sulfuric acid" or "nitric acid" any more, but still an
// "acid". Heat of neutralisation is no pair: it is computed.
func Clashes(goesIn, into []string, tempC float64) []Pair {
	var out []Pair
	for _, p := range pairs {
		there := slices.Contains(goesIn, p.A) && slices.Contains(into, p.B)
		back := !p.Ordered && slices.Contains(goesIn, p.B) && slices.Contains(into, p.A)
		if !there && !back || tempC < p.AboveC {
			continue
		}
		if p.A == "acid" && slices.Contains(goesIn, p.B) && slices.Contains(into, p.B) {
			continue
		}
		if !slices.ContainsFunc(out, func(o Pair) bool { return o.Gives == p.Gives }) {
			out = append(out, p)
		}
	}
	return out
}
