package main

import (
	"math"
	"sort"

	"dregs/equilibrium"
	"dregs/recipe/trace"
)

type sheetReport struct {
	Schema  int           `json:"schema"`
	Version string        `json:"version"`
	Recipe  string        `json:"recipe"`
	File    string        `json:"file"`
	Model   string        `json:"model"`
	Steps   []stepJSON    `json:"steps"`
	Missing []missingJSON `json:"missing"`
	Caution string        `json:"caution"`
}

type stepJSON struct {
	Stage         *string             `json:"stage"`
	Step          string              `json:"step"`
	What          string              `json:"what"`
	Material      *string             `json:"material"`
	At            placeJSON           `json:"at"`
	Tank          string              `json:"tank"`
	Minutes       *float64            `json:"minutes"`
	TemperatureC  *float64            `json:"temperature_c"`
	VolumeL       *float64            `json:"volume_l"`
	MassKg        *float64            `json:"mass_kg"`
	WaterKg       *float64            `json:"water_kg"`
	DensityKgL    *float64            `json:"density_kg_l"`
	PH            *float64            `json:"ph"`
	IonicStrength *float64            `json:"ionic_strength_mol_kg"`
	WaterActivity *float64            `json:"water_activity"`
	Model         string              `json:"model"`
	InModelRange  bool                `json:"in_model_range"`
	Totals        map[string]*float64 `json:"totals_mol_kg"`
	Species       []speciesJSON       `json:"species"`
	Solids        []solidJSON         `json:"solids"`
	Saturation    []saturationJSON    `json:"saturation"`
	Gases         []gasJSON           `json:"gases"`
}

type speciesJSON struct {
	Name       string   `json:"name"`
	Molality   *float64 `json:"molality"`
	Log10Activ *float64 `json:"log10_activity"`
}

type solidJSON struct {
	Name    string   `json:"name"`
	Formula string   `json:"formula"`
	Mol     *float64 `json:"mol"`
	Kg      *float64 `json:"kg"`
}

type saturationJSON struct {
	Name        string   `json:"name"`
	Formula     string   `json:"formula"`
	Index       *float64 `json:"index"`
	Uncertainty *float64 `json:"uncertainty"`
}

type gasJSON struct {
	Name     string   `json:"name"`
	Pressure *float64 `json:"partial_pressure_kpa"`
}

type missingJSON struct {
	What string    `json:"what"`
	Why  string    `json:"why"`
	At   placeJSON `json:"at"`
}

func sheetOf(v *verdict) sheetReport {
	report := sheetReport{Schema: schema, Version: version, Recipe: v.name(), File: v.file, Model: v.trace.System.ModelName(), Steps: []stepJSON{}, Missing: missingOf(v.trace), Caution: caution}
	for _, s := range v.trace.Steps {
		report.Steps = append(report.Steps, stepOfJSON(v.trace.System, s))
	}
	return report
}

func missingOf(tr *trace.Trace) []missingJSON {
	out := []missingJSON{}
	for _, m := range tr.Missing {
		out = append(out, missingJSON{m.What, m.Why, placeOf(m.At)})
	}
	return out
}

func stepOfJSON(sys *equilibrium.System, s *trace.Step) stepJSON {
	l := s.After
	out := stepJSON{
		Step: s.What, What: kindText(s), At: placeOf(s.At), Tank: s.Tank.Name, Minutes: number(s.End),
		Model: sys.ModelName(), Totals: map[string]*float64{}, Species: []speciesJSON{}, Solids: []solidJSON{}, Saturation: []saturationJSON{}, Gases: []gasJSON{},
	}
	if s.Stage != nil {
		out.Stage = optional(s.Stage.Name)
	}
	if s.Charged != nil {
		out.Material = optional(s.Charged.Name)
	}
	if l == nil || l.State == nil {
		return out
	}
	st := l.State
	out.TemperatureC, out.VolumeL, out.MassKg = number(l.TempK-equilibrium.ZeroCelsius), number(l.VolumeL), number(l.MassKg)
	out.WaterKg = number(st.WaterKg)
	for _, solid := range l.Solids {
		phase := sys.Phases[solid.Phase]
		out.Solids = append(out.Solids, solidJSON{phase.Name, phase.Formula, number(solid.Mol), number(solid.Kg)})
	}
	if st.WaterKg <= 0 {
		return out
	}
	out.DensityKgL = number(sys.SolutionMassKg(st) / l.SolutionL)
	out.PH, out.IonicStrength, out.WaterActivity = number(st.PH), number(st.IonicStrength), number(st.WaterActivity)
	out.InModelRange, _ = sys.ModelRange(st)
	for i, n := range dissolved(sys, st) {
		if name := sys.Components[i].Name; name != "H2O" {
			out.Totals[name] = number(n)
		}
	}
	for _, i := range mainSpecies(st) {
		out.Species = append(out.Species, speciesJSON{sys.Species[i].Name, number(st.Molality[i]), number(st.LogActivity10(i))})
	}
	for _, p := range byIndex(st) {
		out.Saturation = append(out.Saturation, saturationJSON{sys.Phases[p].Name, sys.Phases[p].Formula, number(st.Index[p]), number(sys.IndexUncertainty(st, p))})
	}
	for g, gas := range sys.Gases {
		out.Gases = append(out.Gases, gasJSON{gas.Name, number(100 * st.GasBar[g])})
	}
	return out
}

// kindText is the word of the step in a recipe file.
func kindText(s *trace.Step) string {
	if s.Source == nil {
		return "heel"
	}
	return s.Source.Kind.String()
}

// dissolved adds up the species by component, mol per kg of free water.
func dissolved(sys *equilibrium.System, st *equilibrium.State) []float64 {
	totals := make([]float64, len(sys.Components))
	for i, species := range sys.Species {
		for _, part := range species.Parts {
			totals[sys.Index(part.Component)] += part.Coefficient * st.Molality[i]
		}
	}
	return totals
}

// mainSpecies orders the species there are, the greatest molality first.
func mainSpecies(st *equilibrium.State) []int {
	var order []int
	for i, m := range st.Molality {
		if m > 0 {
			order = append(order, i)
		}
	}
	sort.SliceStable(order, func(a, b int) bool { return st.Molality[order[a]] > st.Molality[order[b]] })
	return order
}

// byIndex orders the solids that could be there, the closest first.
func byIndex(st *equilibrium.State) []int {
	var order []int
	for p, index := range st.Index {
		if !math.IsInf(index, 0) && !math.IsNaN(index) {
			order = append(order, p)
		}
	}
	sort.SliceStable(order, func(a, b int) bool { return st.Index[order[a]] > st.Index[order[b]] })
	return order
}
