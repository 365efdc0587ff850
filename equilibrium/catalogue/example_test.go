package catalogue_test

import (
	"fmt"

	"dregs/equilibrium"
	"dregs/equilibrium/catalogue"
)

func ExampleLookup() {
	s, _ := catalogue.Lookup("Epsom salt")
	fmt.Println(s.Formula, s.Parts)
	fmt.Println(catalogue.Assumed("sulfuric acid"))
	// Output:
	// MgSO4.7H2O [{Mg^2+ 1} {SO4^2- 1} {H2O 7}]
	// "sulfuric acid" is taken as H2SO4 of 96 wt%; there is also sulfuric acid 10 %, sulfuric acid 100 %, sulfuric acid 37 %, sulfuric acid 50 %, sulfuric acid 78 %, sulfuric acid 93 %, sulfuric acid 98 %
}

func ExampleDecompose() {
	parts, err := catalogue.Decompose(equilibrium.Default(), "Rb2SO4")
	fmt.Println(parts, err)
	parts, err = catalogue.Decompose(equilibrium.Default(), "(NH4)2Zn(SO4)2.6H2O")
	fmt.Println(parts, err)
	// Output:
	// [] Rb2SO4: the tables have no component for rubidium (Rb); write a material block with contents, in components that are known, or inert = true
	// [{NH4^+ 2} {Zn^2+ 1} {SO4^2- 2} {H2O 6}] <nil>
}
