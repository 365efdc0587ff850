package main

import (
	"io"
	"strings"

	"github.com/spf13/cobra"

	"dregs/checks"
	"dregs/recipe"
)

func (c *call) whyVerb() *cobra.Command {
	return &cobra.Command{
		Use:   "why [CODE...]",
		Short: "explains a code of a finding",
		Long: `why prints a rule in full: what it means, how it is computed, what to do, and when
it is wrong. Without a CODE it lists all codes.`,
		Example: `  dregs why
  dregs why SOL-01`,
		ValidArgsFunction: func(*cobra.Command, []string, string) ([]string, cobra.ShellCompDirective) {
			return checks.Codes(), cobra.ShellCompDirectiveNoFileComp
		},
		RunE: func(_ *cobra.Command, wanted []string) error { return c.why(wanted) },
	}
}

func (c *call) why(wanted []string) error {
	p := c.page()
	if len(wanted) == 0 {
		p.codes()
	}
	for _, code := range wanted {
		e, ok := explain(code)
		if !ok {
			if near := recipe.Nearest(strings.ToUpper(code), checks.Codes()); near != "" {
				return badCallf("there is no code %q; the nearest is %s", code, near)
			}
			return badCallf("there is no code %q; \"dregs why\" lists them", code)
		}
		p.explain(e)
	}
	p.caution()
	io.WriteString(c.out, p.String())
	return nil
}

func explain(code string) (explained, bool) {
	for _, e := range explanations() {
		if strings.EqualFold(e.Code, code) {
			return e, true
		}
	}
	return explained{}, false
}
