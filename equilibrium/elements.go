package equilibrium

import (
	_ "embed"
	"encoding/csv"
	"fmt"
	"strconv"
	"strings"
	"sync"
)

//go:embed tables/elements.csv
var elementsCSV string

// Element is one row of the table of standard atomic weights.
type Element struct {
	Symbol       string
	Name         string
	AtomicWeight float64 // g/mol, abridged standard atomic weight
	Uncertainty  float64 // g/mol, as published with the abridged value
	Source       string
}

var elements = sync.OnceValue(func() map[string]Element {
	rows, err := csv.NewReader(strings.NewReader(elementsCSV)).ReadAll()
	if err != nil {
		panic("equilibrium: tables/elements.csv: " + err.Error())
	}
	table := make(map[string]Element, len(rows))
	for _, row := range rows[1:] {
		weight, err1 := strconv.ParseFloat(row[2], 64)
		uncertainty, err2 := strconv.ParseFloat(row[3], 64)
		if err1 != nil || err2 != nil {
			panic(fmt.Sprintf("equilibrium: tables/elements.csv: row %q has no weight", row[0]))
		}
		table[row[0]] = Element{row[0], row[1], weight, uncertainty, row[4]}
	}
	return table
})

// LookupElement returns the element with the given symbol.
func LookupElement(symbol string) (Element, bool) {
	e, ok := elements()[symbol]
	return e, ok
}
