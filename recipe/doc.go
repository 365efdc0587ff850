// Package recipe is the language: it reads recipe and stock files into a typed
// plan in which every value keeps the place it was written at. It knows no
// chemistry beyond formulas; what a material brings into the water is resolved
// by the walk (package trace).
//
// Reading order: source.go (places, problems), quantity.go and units.go
// (amounts with units and tolerances), plan.go (the plan), guard.go (hostile
// input), read.go and the files it calls, names.go (nearest spelling).
package recipe
