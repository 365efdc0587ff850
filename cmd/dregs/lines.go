package main

import (
	"fmt"
	"strings"
)

// checkLines prints one line a finding, in the error location form of the GNU
// coding standards, for editors and logs.
func (c *call) checkLines(verdicts []*verdict) {
	for _, v := range verdicts {
		for _, f := range v.findings {
			at := location(f.At)
			if f.At.Line == 0 {
				at = v.file
			}
			text := strings.Join(strings.Fields(f.Message), " ")
			for _, r := range f.Remedies {
				if r.Verified {
					text += "; way out: " + r.Text
				}
			}
			level := f.Level.String()
			if f.Waived != nil {
				level = "waived " + level
			}
			fmt.Fprintf(c.out, "%s: %s: %s [%s]\n", printable(at), level, printable(text), f.Code)
		}
	}
	fmt.Fprintf(c.out, "dregs: %s\n", caution)
}
