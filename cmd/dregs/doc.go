// Command dregs answers, for every step of a recipe file, what dissolves and
// what comes out. Nothing is computed here: the verbs read recipes (package
// recipe), have them walked (recipe/trace) and judged (checks), and lay the
// results out for people and programs.
//
// Reading order: main.go and root.go (the call), find.go and judge.go (from
// paths to verdicts), then one file a verb (check.go, sheet.go, beaker.go,
// why.go, data.go) and, beside it, its renderers (screen_*.go for people,
// json_*.go, csv.go and lines.go for programs). page.go and table.go lay out
// text, ions.go and numbers.go write formulas and figures.
package main
