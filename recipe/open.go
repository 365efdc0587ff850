package recipe

import (
	"bytes"

	"github.com/hashicorp/hcl/v2"
	"github.com/hashicorp/hcl/v2/hclsyntax"
)

// Open reads and parses a file of the site that is no recipe, under the same
// guard as recipes. kind names it in messages ("a ruleset").
func Open(path, kind string) (*hclsyntax.Body, *Problem) {
	text, err := readFile(path)
	if err != nil {
		return nil, &Problem{Code: "RCP-01", Level: Stop, Fatal: true, Message: err.Error(), At: Range{File: path, Line: 1, Column: 1, EndLine: 1, EndColumn: 1}}
	}
	return Parse(path, kind, text)
}

// Parse is Open for a text that is in memory.
func Parse(path, kind string, text []byte) (*hclsyntax.Body, *Problem) {
	text = bytes.TrimPrefix(text, []byte("\ufeff"))
	if p := scan(path, text); p != nil {
		return nil, p
	}
	file, diagnostics := hclsyntax.ParseConfig(text, path, hcl.InitialPos)
	for _, d := range diagnostics {
		if d.Severity != hcl.DiagError {
			continue
		}
		at := Range{File: path, Line: 1, Column: 1, EndLine: 1, EndColumn: 1}
		if d.Subject != nil {
			at = Place(*d.Subject)
		}
		return nil, &Problem{Code: "RCP-01", Level: Stop, Fatal: true, Message: "this cannot be read as " + kind + ": " + plainSyntax(d), At: at}
	}
	return file.Body.(*hclsyntax.Body), nil
}

// Place is a range of the HCL library in our terms.
func Place(h hcl.Range) Range { return place(h) }
