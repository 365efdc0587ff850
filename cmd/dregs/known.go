package main

import (
	"strings"

	"dregs/equilibrium"
	"dregs/equilibrium/catalogue"
)

// knownSubstance tells whether the walk will find out what a name brings: pure
// water, a substance of the catalogue, a mineral, or a formula of its components.
func knownSubstance(name string) bool {
	switch strings.ToLower(name) {
	case "water", "demineralised water", "demineralized water", "deionised water", "deionized water", "distilled water", "pure water", "h2o":
		return true
	}
	if _, ok := catalogue.Lookup(name); ok {
		return true
	}
	db := equilibrium.Default()
	if _, ok := db.LookupPhase(name); ok {
		return true
	}
	_, err := catalogue.Decompose(db, name)
	return err == nil
}

func knownPhase(name string) bool {
	_, ok := equilibrium.Default().LookupPhase(name)
	return ok
}

// substanceNames are what a misspelt name may have meant.
func substanceNames() []string {
	return append(append(catalogue.Names(), "water", "demineralised water"), equilibrium.Default().PhaseNames()...)
}

func phaseNames() []string { return equilibrium.Default().PhaseNames() }
