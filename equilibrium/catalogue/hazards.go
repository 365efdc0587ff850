package catalogue

import "slices"

// Class is a hazard class: what a substance is towards others. It is coarser than
// the classes of safety data sheets and serves the pairs of [Pairs] only.
type Class struct{ Name, Meaning string }

// classes is the fixed list; the table of substances may use no other.
var classes = []Class{
	{"acid", "gives acid liquors; sets gases free from salts of weak acids"},
	{"strong acid", "strong acid, or a weaker one at full strength"},
	{"concentrated sulfuric acid", "heats violently with water, chars organics"},
	{"nitric acid", "strong acid that oxidises as well"},
	{"base", "alkaline salt or weak base"},
	{"strong base", "strong alkali; attacks aluminium and zinc, sets ammonia free"},
	{"caustic solid", "solid alkali that heats strongly while it dissolves"},
	{"quicklime", "oxide that slakes in water with much heat"},
	{"ammonia", "ammonia, gaseous or dissolved"},
	{"ammonium salt", "gives ammonia with alkali"},
	{"amine", "organic amine or amino compound; gives chloramines with hypochlorite"},
	{"carbonate", "gives carbon dioxide with acid: foam, pressure"},
	{"sulfite", "gives sulfur dioxide with acid"},
	{"thiosulfate", "gives sulfur dioxide and sulfur with acid"},
	{"sulfide", "gives hydrogen sulfide with acid"},
	{"cyanide", "gives hydrogen cyanide with acid"},
	{"thiocyanate", "gives toxic gases with strong acid and with oxidisers"},
	{"azide", "gives hydrogen azide with acid, explosive salts with heavy metals"},
	{"nitrite", "gives nitrogen oxides with acid, nitrosamines with amines"},
	{"fluoride", "gives hydrogen fluoride with acid"},
	{"hypochlorite", "gives chlorine with acid, chloramines with ammonia"},
	{"chlorine", "chlorine gas"},
	{"chlorite", "gives chlorine dioxide with acid"},
	{"chlorate", "gives chlorine dioxide with strong acid, burns with organics"},
	{"perchlorate", "strong oxidiser when dry or hot"},
	{"peroxide", "oxidiser that decomposes to oxygen, on heavy metals and in alkali"},
	{"permanganate", "strong oxidiser; ignites some organics"},
	{"chromate", "toxic, carcinogenic oxidiser"},
	{"nitrate", "oxidiser when dry or molten, harmless in liquors"},
	{"oxidiser", "oxidises organics, sulfur compounds and metals"},
	{"reducer", "reduces oxidisers with heat and gas"},
	{"organic", "organic matter that oxidisers and concentrated acids attack"},
	{"solvent", "organic liquid that oxidisers and concentrated acids attack at once"},
	{"flammable", "liquid or vapour that burns"},
	{"reactive metal", "metal that gives hydrogen with acid, mostly also with alkali"},
	{"water reactive", "reacts violently with water"},
	{"water", "water and liquors of mostly water"},
	{"silver", "silver salt: gives explosive deposits with ammonia or azide on standing"},
	{"copper", "copper salt: decomposes peroxide; toxic to waters"},
	{"iron", "iron salt: decomposes peroxide"},
	{"nickel", "toxic, carcinogenic, sensitising metal salt"},
	{"cobalt", "toxic, carcinogenic, sensitising metal salt"},
	{"cadmium", "very toxic, carcinogenic metal salt"},
	{"lead", "very toxic metal salt, harms unborn children"},
	{"barium", "toxic metal salt when soluble"},
	{"bromide", "gives bromine with strong oxidisers"},
	{"iodide", "gives iodine with oxidisers"},
	{"chloride", "gives hydrogen chloride with concentrated sulfuric acid, chlorine with strong oxidisers in acid"},
	{"asphyxiant", "gas that displaces air in vessels and pits"},
	{"toxic", "toxic by other ways than the classes above"},
}

// Classes returns every hazard class, in a fixed order.
func Classes() []Class { return slices.Clone(classes) }

// Meaning says in a line what a hazard class means.
func Meaning(class string) (string, bool) {
	for _, c := range classes {
		if c.Name == class {
			return c.Meaning, true
		}
	}
	return "", false
}
