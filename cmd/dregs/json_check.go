package main

import (
	"dregs/checks"
	"dregs/recipe"
)

type checkReport struct {
	Schema   int            `json:"schema"`
	Version  string         `json:"version"`
	Recipes  []recipeReport `json:"recipes"`
	Findings []findingJSON  `json:"findings"` // of all recipes
	Caution  string         `json:"caution"`
}

type recipeReport struct {
	Recipe   *string       `json:"recipe"`
	File     string        `json:"file"`
	Usable   bool          `json:"usable"`
	Worst    *string       `json:"worst"`
	Findings []findingJSON `json:"findings"`
	Problems []problemJSON `json:"problems"` // that make it unusable
	Model    *string       `json:"model"`
}

type findingJSON struct {
	Code        string       `json:"code"`
	Level       string       `json:"level"`
	Message     string       `json:"message"`
	Recipe      string       `json:"recipe"`
	Stage       *string      `json:"stage"`
	Step        *string      `json:"step"`
	Tank        *string      `json:"tank"`
	At          placeJSON    `json:"at"`
	Phase       *string      `json:"phase"`
	Formula     *string      `json:"formula"`
	AmountG     *float64     `json:"amount_g"`
	AmountGPerL *float64     `json:"amount_g_per_l"`
	Index       *float64     `json:"index"`
	Uncertainty *float64     `json:"uncertainty"`
	Probability *float64     `json:"probability"`
	Onset       *float64     `json:"onset"`
	Limits      []string     `json:"limits"`
	Evidence    []string     `json:"evidence"`
	Remedies    []remedyJSON `json:"remedies"`
	Waived      *waiverJSON  `json:"waived"`
}

type remedyJSON struct {
	Text     string `json:"text"`
	Verified bool   `json:"verified"`
}

type waiverJSON struct {
	Because   string  `json:"because"`
	Until     *string `json:"until"`
	Reference *string `json:"reference"`
}

type problemJSON struct {
	Code     string    `json:"code"`
	Level    string    `json:"level"`
	Message  string    `json:"message"`
	Expected *string   `json:"expected"`
	Nearest  *string   `json:"nearest"`
	At       placeJSON `json:"at"`
}

// checkJSON prints all verdicts as one object.
func (c *call) checkJSON(verdicts []*verdict) error {
	report := checkReport{Schema: schema, Version: version, Recipes: []recipeReport{}, Findings: []findingJSON{}, Caution: caution}
	for _, v := range verdicts {
		r := recipeReport{Recipe: optional(v.title), File: v.file, Usable: v.usable(), Findings: []findingJSON{}, Problems: []problemJSON{}, Model: optional(v.model)}
		if worst := v.worst(); worst > 0 {
			r.Worst = optional(worst.String())
		}
		for _, f := range v.findings {
			r.Findings = append(r.Findings, jsonOf(f))
		}
		for _, p := range v.faults {
			r.Problems = append(r.Problems, problemOf(p))
		}
		report.Recipes = append(report.Recipes, r)
		report.Findings = append(report.Findings, r.Findings...)
	}
	return writeJSON(c.out, report)
}

func jsonOf(f checks.Finding) findingJSON {
	out := findingJSON{
		Code: f.Code, Level: f.Level.String(), Message: f.Message, Recipe: f.Recipe,
		Stage: optional(f.Stage), Step: optional(f.Step), Tank: optional(f.Tank), At: placeOf(f.At),
		Phase: optional(f.Phase), Formula: optional(f.Formula),
		AmountG: number(f.AmountG), AmountGPerL: number(f.AmountGPerL), Index: number(f.Index), Uncertainty: number(f.Uncertainty),
		Probability: number(f.Probability), Onset: number(f.Onset),
		Limits: append([]string{}, f.Limits...), Evidence: append([]string{}, f.Evidence...), Remedies: []remedyJSON{},
	}
	for _, r := range f.Remedies {
		if r.Verified {
			out.Remedies = append(out.Remedies, remedyJSON{r.Text, r.Verified})
		}
	}
	if f.Waived != nil {
		out.Waived = &waiverJSON{f.Waived.Because, optional(f.Waived.Until), optional(f.Waived.Reference)}
	}
	return out
}

func problemOf(p recipe.Problem) problemJSON {
	return problemJSON{p.Code, p.Level.String(), p.Message, optional(p.Expected), optional(p.Nearest), placeOf(p.At)}
}
