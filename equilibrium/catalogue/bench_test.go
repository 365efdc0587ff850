package catalogue

import (
	"testing"

	"dregs/equilibrium"
)

func BenchmarkLoad(b *testing.B) {
	b.ReportAllocs()
	for b.Loop() {
		if _, err := load(substancesCSV); err != nil {
			b.Fatal(err)
		}
	}
}

func BenchmarkLookup(b *testing.B) {
	b.ReportAllocs()
	for b.Loop() {
		Lookup("magnesium sulfate heptahydrate")
	}
}

func BenchmarkDecompose(b *testing.B) {
	db := equilibrium.Default()
	b.ReportAllocs()
	for b.Loop() {
		if _, err := Decompose(db, "NH4Al(SO4)2.12H2O"); err != nil {
			b.Fatal(err)
		}
	}
}
