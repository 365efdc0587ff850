package main

import "math"

type dataReport struct {
	Schema  int         `json:"schema"`
	Version string      `json:"version"`
	Word    *string     `json:"word"`
	Data    []entryJSON `json:"data"`
	Caution string      `json:"caution"`
}

type entryJSON struct {
	Kind        string   `json:"kind"`
	Name        string   `json:"name"`
	Formula     *string  `json:"formula"`
	Synonyms    []string `json:"synonyms"`
	Reaction    *string  `json:"reaction"`
	Log10K25C   *float64 `json:"log10_k_25c"`
	Log10K      *float64 `json:"log10_k"` // at the temperature of --at
	Uncertainty *float64 `json:"uncertainty"`
	FromC       *float64 `json:"from_c"`
	ToC         *float64 `json:"to_c"`
	Forms       *string  `json:"forms"`
	MolarMass   *float64 `json:"molar_mass_g_mol"`
	DensityKgL  *float64 `json:"density_kg_l"`
	Source      string   `json:"source"`
	FromMemory  bool     `json:"from_memory"`
	Note        *string  `json:"note"`
}

func (c *call) dataJSON(word string, entries []entry, tempK float64) error {
	report := dataReport{Schema: schema, Version: version, Word: optional(word), Data: []entryJSON{}, Caution: caution}
	for _, e := range entries {
		j := entryJSON{Kind: e.kind, Name: e.name, Formula: optional(e.formula), Synonyms: append([]string{}, e.synonyms...), Reaction: optional(e.reaction),
			Forms: optional(e.forms), MolarMass: number(e.molarMass), DensityKgL: number(e.density), Source: e.Source, FromMemory: e.FromMemory, Note: optional(e.Note)}
		if k := e.logK; k != nil {
			j.Log10K25C, j.Uncertainty, j.FromC, j.ToC = number(k.At25C), number(k.Uncertainty), number(k.MinC), number(k.MaxC)
			if !math.IsNaN(tempK) {
				j.Log10K, j.Uncertainty = number(k.At(tempK)), number(k.UncertaintyAt(tempK))
			}
		}
		report.Data = append(report.Data, j)
	}
	return writeJSON(c.out, report)
}
