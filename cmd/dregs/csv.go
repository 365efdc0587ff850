package main

import (
	"encoding/csv"
	"fmt"
	"strconv"
	"strings"

	"dregs/equilibrium"
	"dregs/recipe/trace"
)

var sheetColumns = []string{"stage", "step", "tank", "file", "line", "minutes", "temperature_c", "volume_l", "mass_kg", "water_kg", "density_kg_l", "ph", "ionic_strength_mol_kg", "water_activity", "solids_kg", "solids", "closest"}

// sheetCSV prints one row a step; the caution is the last line, a comment.
func (c *call) sheetCSV(v *verdict) error {
	return c.stepsCSV(v.trace.System, v.trace.Steps)
}

func (c *call) stepsCSV(sys *equilibrium.System, steps []*trace.Step) error {
	w := csv.NewWriter(c.out)
	w.Write(sheetColumns)
	for _, s := range steps {
		w.Write(sheetRow(sys, s))
	}
	w.Flush()
	if err := w.Error(); err != nil {
		return err
	}
	_, err := fmt.Fprintf(c.out, "# %s\n", caution)
	return err
}

func sheetRow(sys *equilibrium.System, s *trace.Step) []string {
	j := stepOfJSON(sys, s)
	stage := ""
	if j.Stage != nil {
		stage = *j.Stage
	}
	var solids, closest []string
	sum := 0.0
	for _, solid := range j.Solids {
		solids = append(solids, solid.Name+" "+cell(solid.Kg)+" kg")
		sum += *solid.Kg
	}
	for _, n := range closestOf(sys, s) {
		closest = append(closest, n.name+" "+fixed(n.index, 2))
	}
	return []string{stage, j.Step, j.Tank, j.At.File, strconv.Itoa(j.At.Line), cell(j.Minutes), cell(j.TemperatureC), cell(j.VolumeL), cell(j.MassKg), cell(j.WaterKg), cell(j.DensityKgL),
		cell(j.PH), cell(j.IonicStrength), cell(j.WaterActivity), plainNumber(sum), strings.Join(solids, "; "), strings.Join(closest, "; ")}
}

const closestShown = 3

func closestOf(sys *equilibrium.System, s *trace.Step) []near {
	return closest(sys, s.After, closestShown)
}

func cell(x *float64) string {
	if x == nil {
		return ""
	}
	return plainNumber(*x)
}
