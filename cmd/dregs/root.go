package main

import (
	"errors"
	"fmt"
	"strings"

	"github.com/spf13/cobra"
	"github.com/spf13/pflag"

	"dregs/recipe"
)

// badCall is a fault of the command line, already in words for the user.
type badCall struct{ text string }

func (b badCall) Error() string { return b.text }

func badCallf(format string, args ...any) error { return badCall{fmt.Sprintf(format, args...)} }

// main runs the verb that the arguments name and returns the exit code.
func (c *call) main(arguments []string) int {
	root := c.root()
	root.SetArgs(arguments)
	root.SetOut(c.out)
	root.SetErr(c.fault)
	root.SetIn(c.in)
	if verb, err := root.ExecuteC(); err != nil {
		c.faultf("%s", err)
		if bad := (badCall{}); errors.As(err, &bad) {
			fmt.Fprintf(c.fault, "       see: %s --help\n", verb.CommandPath())
		}
	}
	return c.code
}

func (c *call) root() *cobra.Command {
	root := &cobra.Command{
		Use:   "dregs",
		Short: "tells what dissolves and what comes out at every step of a batch recipe",
		Long: `dregs walks recipe files (*.recipe.hcl) through their tanks, step by step, in
chemical equilibrium, and tells what does not dissolve, what comes out that
should not, what should come out and does not, and how close it is.`,
		Example: `  dregs check examples                   findings of all recipes in a folder
  dregs sheet rinse.recipe.hcl           the batch, stage by stage
  dregs beaker "1 kg water" "3 g CaSO4.2H2O" --at "25 degC"`,
		Version:               version,
		SilenceErrors:         true,
		SilenceUsage:          true,
		DisableFlagsInUseLine: true,
		PersistentPreRunE:     func(*cobra.Command, []string) error { return oneOf("--colour", c.colour, "auto", "always", "never") },
		RunE: func(cmd *cobra.Command, arguments []string) error {
			if len(arguments) == 0 {
				return cmd.Help()
			}
			return unknownVerb(cmd, arguments[0])
		},
		Args: cobra.ArbitraryArgs,
	}
	root.SetVersionTemplate("dregs {{.Version}}\n")
	root.SetUsageTemplate(usageTemplate)
	root.SetHelpTemplate("{{with (or .Long .Short)}}{{. | trimTrailingWhitespaces}}\n\n{{end}}{{.UsageString}}\n" + wrapPlain(caution, usualWidth) + "\n")
	root.SetFlagErrorFunc(flagFault)
	root.PersistentFlags().StringVar(&c.colour, "colour", "auto", "auto, always or never; auto keeps NO_COLOR")
	root.SetHelpCommand(&cobra.Command{Use: "help [VERB]", Short: "tells how a verb is used", Hidden: true, RunE: func(_ *cobra.Command, arguments []string) error {
		verb, rest, err := root.Find(arguments)
		if err != nil || len(rest) > 0 {
			return unknownVerb(root, arguments[0])
		}
		return verb.Help()
	}})
	root.AddCommand(c.checkVerb(), c.sheetVerb(), c.beakerVerb(), c.whyVerb(), c.dataVerb())
	root.InitDefaultCompletionCmd()
	for _, verb := range root.Commands() {
		verb.DisableFlagsInUseLine = true
		if verb.Name() == "completion" {
			verb.Short = "prints a script that completes verbs and options in a shell"
		}
	}
	return root
}

const usageTemplate = `{{if .Runnable}}call     {{.UseLine}} [options]
{{end}}{{if .HasAvailableSubCommands}}
verbs
{{range .Commands}}{{if .IsAvailableCommand}}  {{rpad .Name 12}} {{.Short}}
{{end}}{{end}}{{end}}{{if .HasAvailableLocalFlags}}
options
{{.LocalFlags.FlagUsages | trimTrailingWhitespaces}}
{{end}}{{if .HasAvailableInheritedFlags}}{{.InheritedFlags.FlagUsages | trimTrailingWhitespaces}}
{{end}}{{if .HasExample}}
examples
{{.Example}}
{{end}}`

func unknownVerb(root *cobra.Command, word string) error {
	var verbs []string
	for _, verb := range root.Commands() {
		if verb.IsAvailableCommand() {
			verbs = append(verbs, verb.Name())
		}
	}
	if near := recipe.Nearest(word, verbs); near != "" {
		return badCallf("there is no verb %q; the nearest is %q", word, near)
	}
	return badCallf("there is no verb %q, expected one of %s", word, strings.Join(verbs, ", "))
}

// flagFault puts what the flag library says into our words.
func flagFault(cmd *cobra.Command, err error) error {
	var unknown *pflag.NotExistError
	if errors.As(err, &unknown) {
		var names []string
		cmd.Flags().VisitAll(func(f *pflag.Flag) { names = append(names, f.Name) })
		name := unknown.GetSpecifiedName()
		if strings.Trim(name[:1], "0123456789.") == "" {
			return badCallf("what begins with a hyphen is taken for an option; an amount is never negative")
		}
		if near := recipe.Nearest(name, names); near != "" {
			return badCallf("%s has no option %q; the nearest is --%s", cmd.CommandPath(), name, near)
		}
		return badCallf("%s has no option %q", cmd.CommandPath(), name)
	}
	var lacking *pflag.ValueRequiredError
	if errors.As(err, &lacking) {
		return badCallf("option --%s needs a value", lacking.GetSpecifiedName())
	}
	var invalid *pflag.InvalidValueError
	if errors.As(err, &invalid) {
		return badCallf("option --%s does not take %q", invalid.GetFlag().Name, invalid.GetValue())
	}
	return badCallf("%s", err)
}

// oneOf checks the value of an option that takes words.
func oneOf(option, value string, words ...string) error {
	for _, word := range words {
		if value == word {
			return nil
		}
	}
	if near := recipe.Nearest(value, words); near != "" {
		return badCallf("option %s does not take %q; the nearest is %q", option, value, near)
	}
	return badCallf("option %s does not take %q, expected one of %s", option, value, strings.Join(words, ", "))
}
