// Package catalogue knows what plants charge: salts, hydrates, acids, bases,
// buffers, chelants and organics, by formula, trade name and synonym, each with
// the components that it brings into the water.
//
// A name without a strength means what is usual to buy: "sulfuric acid" is the
// acid of 96 wt%, "acetic acid" the glacial one; the note of the entry says so.
// A formula always means the pure substance.
//
// Files, in reading order: substance.go the type; substances.csv the entries;
// load.go reads them; lookup.go finds them; decompose.go takes apart formulas
// that the catalogue lacks, with the groups of groups.go; hazards.go the classes
// and pairs.go what must not meet. Hazards are reminders for people who have the
// safety data sheet in hand: they replace neither that nor the site's procedures.
package catalogue
