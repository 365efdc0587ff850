package main

import (
	"math"
	"strings"

	"github.com/spf13/cobra"

	"dregs/equilibrium"
	"dregs/equilibrium/catalogue"
	"dregs/recipe"
)

func database() *equilibrium.Database { return equilibrium.Default() }

func (c *call) dataVerb() *cobra.Command {
	var at, as string
	verb := &cobra.Command{
		Use:   "data [WORD]",
		Short: "shows constants with range, uncertainty and source",
		Long: `data prints the constants of every component, species, solid, gas and substance
whose name, formula, synonym or ion is or holds WORD: the reaction, log10 K at
25 °C and at the temperature of --at, the range that the source vouches for, the
uncertainty, how readily a solid forms, and where the figure comes from. "from
memory" marks figures that nobody has read again in the publication named.
Without a WORD it tells how much there is.`,
		Example: `  dregs data
  dregs data gypsum
  dregs data Ca^2+ --at "60 degC"
  dregs data "citric acid"`,
		RunE: func(_ *cobra.Command, words []string) error {
			return c.data(strings.Join(words, " "), at, as)
		},
	}
	verb.Flags().StringVar(&at, "at", "", "`TEMPERATURE` at which constants are told besides 25 °C")
	verb.Flags().StringVar(&as, "as", "text", "text or json")
	return verb
}

func (c *call) data(word, at, as string) error {
	if err := oneOf("--as", as, "text", "json"); err != nil {
		return err
	}
	tempK := math.NaN()
	if at != "" {
		q, err := recipe.ParseQuantity(at, recipe.Temperature)
		if err != nil {
			return badCallf("option --at: %v", err)
		}
		tempK = q.Value
	}
	entries := c.entries(word)
	if word != "" && len(entries) == 0 {
		near := recipe.Nearest(word, append(substanceNames(), speciesNames()...))
		if near != "" {
			return badCallf("no data under %q; the nearest is %q", word, near)
		}
		return badCallf("no data under %q", word)
	}
	if as == "json" {
		return c.dataJSON(word, entries, tempK)
	}
	c.dataScreen(word, entries, tempK)
	return nil
}

func speciesNames() []string {
	var out []string
	for _, s := range database().Species {
		out = append(out, s.Name)
	}
	for _, c := range database().Components {
		out = append(out, c.Name)
	}
	return out
}

// entry is one row of the tables or of the catalogue.
type entry struct {
	kind      string // component, dissolved, solid, gas, substance
	name      string
	formula   string
	synonyms  []string
	reaction  string
	logK      *equilibrium.LogK
	forms     string
	density   float64
	molarMass float64
	substance *catalogue.Substance
	equilibrium.Origin
}

// entries are the rows that a word finds: those that bear the name or formula;
// when there is none, those whose name holds the word; and for an ion, all rows
// that it is a part of.
func (c *call) entries(word string) []entry {
	exact := func(names ...string) bool {
		for _, name := range names {
			if strings.EqualFold(name, word) && (name == word || len(word) > 3) {
				return true
			}
		}
		return false
	}
	holds := func(names ...string) bool {
		for _, name := range names {
			if len(word) > 2 && strings.Contains(strings.ToLower(name), strings.ToLower(word)) {
				return true
			}
		}
		return false
	}
	all := allEntries()
	if word == "" {
		return all
	}
	ion := ""
	for _, component := range database().Components {
		if name := component.Name; bareIon(name) == bareIon(word) && name != "H2O" && name != "H^+" {
			ion, word = name, name
		}
	}
	for _, match := range []func(...string) bool{exact, holds} {
		var out []entry
		for _, e := range all {
			names := append([]string{e.name, e.formula, bareName(e.name)}, e.synonyms...)
			if match(names...) || ion != "" && e.holdsIon(ion) {
				out = append(out, e)
			}
		}
		if len(out) > 0 {
			return out
		}
	}
	return nil
}

// holdsIon tells whether an ion stands in the reaction.
func (e *entry) holdsIon(ion string) bool {
	for _, word := range strings.Fields(e.reaction) {
		if word == ion {
			return true
		}
	}
	return false
}

// bareIon makes the writings of an ion comparable: SO4^2-, SO42-, SO₄²⁻.
func bareIon(name string) string { return strings.ReplaceAll(plainIon.Replace(name), "^", "") }

// bareName is a name without charge and state: CO2 of CO2(aq).
func bareName(name string) string {
	name, _, _ = strings.Cut(name, "^")
	return strings.TrimSuffix(name, "(aq)")
}
