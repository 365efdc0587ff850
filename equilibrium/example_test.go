package equilibrium_test

import (
	"fmt"
	"log"

	"dregs/equilibrium"
)

// Three grams of gypsum in a kilogram of water at 25 °C: some of it stays.
func ExampleSolver_Solve() {
	system, err := equilibrium.Default().NewSystem([]string{"Ca^2+", "SO4^2-"})
	if err != nil {
		log.Fatal(err)
	}
	gypsum := 3 / equilibrium.MustParseFormula("CaSO4.2H2O").MolarMass() // mol
	totals := make([]float64, len(system.Components))
	totals[system.Index("H2O")] = 1000/equilibrium.MustParseFormula("H2O").MolarMass() + 2*gypsum
	totals[system.Index("Ca^2+")] = gypsum
	totals[system.Index("SO4^2-")] = gypsum

	state := system.NewState()
	if err := system.NewSolver().Solve(totals, &equilibrium.Conditions{TempK: 298.15}, state); err != nil {
		log.Fatal(err)
	}
	left := state.SolidMol[system.PhaseIndex("gypsum")]
	fmt.Printf("some stays: %t, pH between 6.9 and 7.2: %t\n", left > 0 && left < gypsum, state.PH > 6.9 && state.PH < 7.2)
	// Output: some stays: true, pH between 6.9 and 7.2: true
}
