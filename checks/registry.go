package checks

import "dregs/recipe"

// All is every rule over a trace, by code. The RCP family belongs to package
// recipe.
var All = []*Rule{
	{"DIS-01", "a charge does not all dissolve", undissolvedText, recipe.Stop, runUndissolved},
	{"DIS-03", "a charge dissolves within tolerance of its limit", nearLimitText, recipe.Caution, runNearLimit},
	{"FEED-01", "a solid flashes out where the feed meets the bulk", feedText, recipe.Caution, runFeed},
	{"GAS-01", "gas leaves the liquor", gasText, recipe.Caution, runGas},
	{"HAZ-01", "substances meet that common practice keeps apart", pairsText, recipe.Caution, runPairs},
	{"HAZ-02", "the order of charging heats or spatters", orderText, recipe.Caution, runOrder},
	{"LAB-01", "a sample will not meet its limit", sampleText, recipe.Stop, runSample},
	{"SAT-02", "oversaturated, may stay clear for a while", mildText, recipe.Caution, runMild},
	{"SAT-03", "oversaturated at the coldest place", coldText, recipe.Caution, runCold},
	{"SAT-04", "oversaturated after meeting the air", airText, recipe.Caution, runAir},
	{"SOL-01", "a solid comes down that the recipe does not plan", unplannedText, recipe.Stop, runUnplanned},
	{"SOL-02", "a planned solid is missing or short", plannedText, recipe.Stop, runPlanned},
	{"SOL-04", "a solid is carried into the next tank", carriedText, recipe.Caution, runCarried},
	{"SOL-05", "a slow solid may form on standing", agedText, recipe.Caution, runAged},
	{"SOL-06", "a hydrate or form changes into another", hydrateText, recipe.Caution, runHydrate},
	{"TRUST-01", "outside the range of the model", rangeText, recipe.Note, runRange},
	{"TRUST-02", "data are missing or taken on trust", missingText, recipe.Note, runMissing},
	{"TRUST-04", "the analysis of a water does not balance", analysisText, recipe.Note, runAnalysis},
	{"TRUST-05", "air may oxidise; that is not computed", oxidationText, recipe.Note, runOxidation},
	{"VES-01", "a tank overfills", overfillText, recipe.Stop, runOverfill},
	{"VES-02", "a tank is drawn below its stirrer or empty", lowText, recipe.Caution, runLow},
	{"VES-03", "a tank is outside its rating", ratingText, recipe.Stop, runRating},
}

// Lookup finds a rule by its code.
func Lookup(code string) (*Rule, bool) {
	for _, r := range All {
		if r.Code == code {
			return r, true
		}
	}
	return nil, false
}

// Codes lists the codes of all rules and of the RCP family.
func Codes() []string {
	var out []string
	for _, r := range All {
		out = append(out, r.Code)
	}
	for _, c := range recipe.Codes {
		out = append(out, c.Code)
	}
	return out
}
