package recipe

// Options of reading.
type Options struct {
	Set map[string]string // parameters, and "batch"
	// KnownSubstance and KnownPhase tell what the catalogue and tables hold;
	// Substances and Phases list the names, for the nearest spelling.
	KnownSubstance, KnownPhase func(string) bool
	Substances, Phases         func() []string
	// KnownRule tells which finding codes a waiver may name.
	KnownRule func(string) bool
	Rules     func() []string
	// Root limits what files may be read; "" finds the repository root above the
	// recipe (a folder holding .git), or the recipe's own folder.
	Root string
}

// Load reads the recipe file at path. Problems are told all at once; the recipe
// is nil only when nothing usable was read.
func Load(path string, o Options) (*Recipe, []Problem) { panic("soon") }

// LoadBytes reads a recipe from memory; path is what places name and what
// relative paths start from.
func LoadBytes(path string, text []byte, o Options) (*Recipe, []Problem) { panic("soon") }

// ParseQuantity reads one amount outside a file, of one of the given dimensions.
func ParseQuantity(text string, want ...Dimension) (Quantity, error) { panic("soon") }

// Nearest returns the candidate closest in spelling, "" when none is near.
func Nearest(word string, candidates []string) string { panic("soon") }
