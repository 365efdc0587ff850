package main

type beakerReport struct {
	Schema  int    `json:"schema"`
	Version string `json:"version"`
	stepJSON
	Headspace string          `json:"headspace"`
	Dissolved []dissolvedJSON `json:"dissolved"`
	Missing   []missingJSON   `json:"missing"`
	Caution   string          `json:"caution"`
}

type dissolvedJSON struct {
	Name       string   `json:"name"`
	Formula    string   `json:"formula"`
	ChargedG   *float64 `json:"charged_g"`
	DissolvedG *float64 `json:"dissolved_g"`
	PerL       *float64 `json:"dissolved_g_per_l"`
	StaysG     *float64 `json:"stays_g"`
	Elsewhere  []string `json:"partly_in"` // other solids that hold part of what dissolved
}

// beakerJSON prints the mix as one step, with what became of the solids.
func (c *call) beakerJSON(m *mix) error {
	report := beakerReport{Schema: schema, Version: version, stepJSON: stepOfJSON(m.trace.System, m.final), Headspace: m.air, Dissolved: []dissolvedJSON{}, Missing: missingOf(m.trace), Caution: caution}
	report.Step, report.What = "mix", "mix"
	for _, d := range m.becameOf() {
		report.Dissolved = append(report.Dissolved, dissolvedJSON{d.name, d.formula, number(d.chargedG), number(d.goneG()), number(d.perL()), number(d.leftG), append([]string{}, d.elsewhere...)})
	}
	return writeJSON(c.out, report)
}
