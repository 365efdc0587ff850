package catalogue

import (
	"fmt"
	"slices"
	"sort"
	"strings"
)

// waterWords end the name of a substance whose water of crystallisation is told.
var waterWords = map[string]bool{"anhydrous": true, "hemihydrate": true, "monohydrate": true, "sesquihydrate": true, "dihydrate": true, "hemipentahydrate": true, "trihydrate": true, "tetrahydrate": true, "pentahydrate": true, "hexahydrate": true, "heptahydrate": true, "octahydrate": true, "nonahydrate": true, "decahydrate": true, "dodecahydrate": true, "tetradecahydrate": true, "hexadecahydrate": true, "octadecahydrate": true}

// Assumed says what a name was taken for when it leaves the water of
// crystallisation or the strength open: "magnesium sulfate" may be Epsom salt,
// half of which is water. It is "" for names and formulas that leave nothing open.
func Assumed(name string) string {
	b := built()
	key := foldName(name)
	s, ok := b.byName[key]
	if !ok {
		return ""
	}
	var others []string
	for _, o := range b.stems()[key] {
		if o.Formula != s.Formula || o.StrengthWt != s.StrengthWt {
			others = append(others, o.Name)
		}
	}
	if len(others) == 0 {
		return ""
	}
	sort.Strings(others)
	what := s.Formula
	if s.StrengthWt < 1 {
		what = fmt.Sprintf("%s of %.3g wt%%", s.Formula, 100*s.StrengthWt)
	}
	return fmt.Sprintf("%q is taken as %s; there is also %s", name, what, strings.Join(others, ", "))
}

// stemOf cuts the word that tells the water or the strength from a folded name.
func stemOf(key string) (string, bool) {
	at := strings.LastIndexByte(key, ' ')
	if at < 0 {
		at = strings.IndexAny(key, "0123456789")
		if at < 1 || !strings.HasSuffix(key, "%") {
			return "", false
		}
	}
	last := strings.TrimSpace(key[at:])
	if waterWords[last] || strings.HasSuffix(last, "%") {
		return strings.TrimSpace(key[:at]), true
	}
	return "", false
}

// allStems tells which names could have been meant by a shorter one.
func (b *book) allStems() map[string][]*Substance {
	stems := map[string][]*Substance{}
	for key, s := range b.byName {
		if stem, ok := stemOf(key); ok && !slices.Contains(stems[stem], s) {
			stems[stem] = append(stems[stem], s)
		}
	}
	return stems
}
