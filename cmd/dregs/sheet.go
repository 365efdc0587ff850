package main

import (
	"github.com/spf13/cobra"
)

func (c *call) sheetVerb() *cobra.Command {
	var as string
	var set []string
	verb := &cobra.Command{
		Use:   "sheet RECIPE",
		Short: "prints a batch stage by stage: volume, temperature, pH, solids",
		Long: `sheet walks one recipe and prints what is in the tank after every step: volume,
temperature, pH, ionic strength, solids, and the solids closest to coming down
with their saturation index. "-" reads the recipe from standard input.

In JSON, "minutes" counts from the start of the batch to the end of the step,
"totals_mol_kg" is what is dissolved of each component per kg of free water, and
what was not computed is null.`,
		Example: `  dregs sheet rinse.recipe.hcl
  dregs sheet --set "batch=2 m3" rinse.recipe.hcl
  dregs sheet --as csv rinse.recipe.hcl > rinse.csv`,
		RunE: func(_ *cobra.Command, paths []string) error {
			if len(paths) != 1 {
				return badCallf("sheet takes one recipe, %d were given", len(paths))
			}
			return c.sheet(paths[0], as, set)
		},
	}
	verb.Flags().StringVar(&as, "as", "text", "text, csv or json")
	verb.Flags().StringArrayVar(&set, "set", nil, "give a parameter, or batch, another value: `NAME=VALUE`; may be repeated")
	return verb
}

func (c *call) sheet(path, as string, set []string) error {
	if err := oneOf("--as", as, "text", "csv", "json"); err != nil {
		return err
	}
	read, err := readOptions(set)
	if err != nil {
		return err
	}
	files := c.findRecipes([]string{path})
	if len(files) != 1 {
		if len(files) > 1 {
			return badCallf("sheet takes one recipe, %s holds %d", path, len(files))
		}
		return nil // told
	}
	v := c.load(files[0], read)
	c.tellFaults(v, false)
	if v.trace == nil || v.trace.System == nil || len(v.trace.Steps) == 0 && !v.usable() {
		return nil
	}
	switch as {
	case "json":
		return writeJSON(c.out, sheetOf(v))
	case "csv":
		return c.sheetCSV(v)
	}
	c.sheetScreen(v)
	return nil
}
