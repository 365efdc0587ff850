package main

import (
	"runtime"
	"sync"

	"github.com/spf13/cobra"

	"dregs/checks"
	"dregs/recipe"
)

type checkOptions struct {
	as, failOn string
	rules      string
	set        []string
	jobs       int
}

func (c *call) checkVerb() *cobra.Command {
	var o checkOptions
	verb := &cobra.Command{
		Use:   "check [PATH...]",
		Short: "finds what will not dissolve, and what comes out, in recipes",
		Long: `check walks every recipe and tells its findings, each at its line. Folders are
searched for *.recipe.hcl, "-" reads one recipe from standard input; without a
PATH the folder you are in is searched.

Findings go to standard output; what makes a recipe or the call unusable goes to
standard error. Exit code 0: no finding at or above --fail-on. 1: there is one.
2: something could not be used; the other recipes are checked all the same.
A waived finding is shown and does not count.`,
		Example: `  dregs check examples
  dregs check --fail-on caution --as lines rinse.recipe.hcl
  dregs check --set "final pH=6.5" --set "batch=2 m3" rinse.recipe.hcl
  dregs check --as json - < rinse.recipe.hcl`,
		RunE: func(_ *cobra.Command, paths []string) error { return c.check(paths, o) },
	}
	f := verb.Flags()
	f.StringVar(&o.as, "as", "text", "text, lines or json")
	f.StringVar(&o.failOn, "fail-on", "stop", "least level that gives exit code 1: stop, caution, note or never")
	f.StringVar(&o.rules, "rules", "", "`FILE` with limits and levels, after those that the recipe names")
	f.StringArrayVar(&o.set, "set", nil, "give a parameter, or batch, another value: `NAME=VALUE`; may be repeated")
	f.IntVar(&o.jobs, "jobs", runtime.GOMAXPROCS(0), "recipes checked at a time")
	return verb
}

var failLevels = map[string]recipe.Level{"note": recipe.Note, "caution": recipe.Caution, "stop": recipe.Stop, "never": recipe.Stop + 1}

func (c *call) check(paths []string, o checkOptions) error {
	if err := oneOf("--as", o.as, "text", "lines", "json"); err != nil {
		return err
	}
	if err := oneOf("--fail-on", o.failOn, "stop", "caution", "note", "never"); err != nil {
		return err
	}
	if o.jobs < 1 {
		return badCallf("option --jobs does not take %d, expected 1 or more", o.jobs)
	}
	read, err := readOptions(o.set)
	if err != nil {
		return err
	}
	if len(paths) == 0 {
		paths = []string{"."}
	}
	limits := &rulebook{site: o.rules}
	if _, problems := limits.forRecipe(nil); len(problems) > 0 {
		c.tellFaults(&verdict{file: o.rules, faults: problems}, o.as == "lines")
		return nil
	}
	files := c.findRecipes(paths)
	verdicts := c.judgeAll(files, read, limits, o.jobs)
	failLevel := failLevels[o.failOn]
	for _, v := range verdicts {
		if v.worst() >= failLevel && c.code == exitClear {
			c.code = exitFindings
		}
		c.tellFaults(v, o.as == "lines")
	}
	switch o.as {
	case "json":
		return c.checkJSON(verdicts)
	case "lines":
		c.checkLines(verdicts)
	default:
		c.checkScreen(verdicts)
	}
	return nil
}

// judge applies the rules under the limits that the recipe and the call name.
func (v *verdict) judge(limits *rulebook) {
	thresholds, problems := limits.forRecipe(v.recipe)
	if len(problems) > 0 {
		v.faults = problems
		return
	}
	v.findings = checks.Run(v.trace, v.advice, thresholds)
	v.note()
}

// judgeAll checks the recipes with several workers; the order of the verdicts is
// that of the files.
func (c *call) judgeAll(files []string, read recipe.Options, limits *rulebook, jobs int) []*verdict {
	verdicts := make([]*verdict, len(files))
	next := make(chan int)
	var workers sync.WaitGroup
	for range min(jobs, len(files)) {
		workers.Add(1)
		go func() {
			defer workers.Done()
			for i := range next {
				v := c.load(files[i], read)
				if v.usable() {
					v.judge(limits)
				}
				v.close()
				verdicts[i] = v
			}
		}()
	}
	for i := range files {
		next <- i
	}
	close(next)
	workers.Wait()
	return verdicts
}
