package recipe

import (
	"bytes"
	"fmt"
	"io"
	"os"
	"path/filepath"
	"strings"
	"unicode/utf8"

	"github.com/hashicorp/hcl/v2"
	"github.com/hashicorp/hcl/v2/hclsyntax"
)

// Limits of what is read: no recipe needs more, and deep nesting or endless
// numbers would stop the parser instead of being refused by it.
const (
	mostBytes    = 1 << 20
	mostDepth    = 64
	mostDigits   = 40
	mostUnary    = 16
	mostBraces   = 4000 // blocks and objects
	mostTokens   = 200_000
	mostProblems = 50
)

// readFile reads an ordinary file of bounded size.
func readFile(path string) ([]byte, error) {
	info, err := os.Stat(path)
	switch {
	case err != nil && os.IsNotExist(err):
		return nil, fmt.Errorf("there is no file %s", path)
	case err != nil:
		return nil, fmt.Errorf("%s cannot be read", path)
	case info.IsDir():
		return nil, fmt.Errorf("%s is a folder, expected a file", path)
	case !info.Mode().IsRegular():
		return nil, fmt.Errorf("%s is not an ordinary file", path)
	case info.Size() > mostBytes:
		return nil, fmt.Errorf("%s has %d bytes, the limit is %d", path, info.Size(), mostBytes)
	}
	f, err := os.Open(path)
	if err != nil {
		return nil, fmt.Errorf("%s cannot be opened", path)
	}
	defer f.Close()
	text, err := io.ReadAll(io.LimitReader(f, mostBytes+1))
	if err != nil {
		return nil, fmt.Errorf("%s cannot be read", path)
	}
	return text, nil
}

// inside tells whether path, symbolic links followed, lies in root. A file that is
// not there is judged by its path alone.
func inside(root, path string) bool {
	if resolved, err := filepath.EvalSymlinks(path); err == nil {
		path = resolved
		if root, err = filepath.EvalSymlinks(root); err != nil {
			return false
		}
	}
	r, err1 := filepath.Abs(root)
	p, err2 := filepath.Abs(path)
	if err1 != nil || err2 != nil {
		return false
	}
	rel, err := filepath.Rel(r, p)
	return err == nil && rel != ".." && !strings.HasPrefix(rel, ".."+string(filepath.Separator))
}

// repositoryRoot is the folder above path that holds .git, or the file's own.
func repositoryRoot(path string) string {
	dir, err := filepath.Abs(filepath.Dir(path))
	if err != nil {
		return filepath.Dir(path)
	}
	own := dir
	for {
		if _, err := os.Stat(filepath.Join(dir, ".git")); err == nil {
			return dir
		}
		up := filepath.Dir(dir)
		if up == dir {
			return own
		}
		dir = up
	}
}

// scan refuses what would hurt the parser, before it sees it.
func scan(file string, text []byte) *Problem {
	at := func(b int) Range {
		line := 1 + bytes.Count(text[:b], []byte{'\n'})
		column := 1 + utf8.RuneCount(text[bytes.LastIndexByte(text[:b], '\n')+1:b])
		return Range{file, line, column, line, column + 1, b, b + 1}
	}
	refuse := func(code string, b int, format string, args ...any) *Problem {
		return &Problem{Code: code, Level: Stop, Fatal: true, Message: fmt.Sprintf(format, args...), At: at(b)}
	}
	if len(text) > mostBytes {
		return refuse("RCP-08", 0, "the file has more than %d bytes", mostBytes)
	}
	if !utf8.Valid(text) {
		for i := 0; i < len(text); {
			r, n := utf8.DecodeRune(text[i:])
			if r == utf8.RuneError && n == 1 {
				return refuse("RCP-01", i, "the file is not UTF-8 text: byte %#x here", text[i])
			}
			i += n
		}
	}
	if i := bytes.IndexByte(text, 0); i >= 0 {
		return refuse("RCP-01", i, "the file holds a zero byte; expected text")
	}
	tokens, _ := hclsyntax.LexConfig(text, file, hcl.InitialPos)
	if len(tokens) > mostTokens {
		return refuse("RCP-08", tokens[mostTokens].Range.Start.Byte, "the file has more than %d words and signs", mostTokens)
	}
	depth, unary, braces := 0, 0, 0
	chain, last := 0, hclsyntax.TokenNil // indices and dots that hang on one another
	for _, t := range tokens {
		switch t.Type {
		case hclsyntax.TokenOBrace, hclsyntax.TokenOBrack, hclsyntax.TokenOParen, hclsyntax.TokenTemplateInterp, hclsyntax.TokenTemplateControl, hclsyntax.TokenOQuote:
			depth++
			if depth > mostDepth {
				return refuse("RCP-08", t.Range.Start.Byte, "brackets are nested more than %d deep", mostDepth)
			}
		case hclsyntax.TokenCBrace, hclsyntax.TokenCBrack, hclsyntax.TokenCParen, hclsyntax.TokenTemplateSeqEnd, hclsyntax.TokenCQuote:
			depth--
		case hclsyntax.TokenNumberLit:
			if len(t.Bytes) > mostDigits {
				return refuse("RCP-08", t.Range.Start.Byte, "a number of %d characters is too long", len(t.Bytes))
			}
		}
		switch t.Type {
		// Conditionals, loops in templates and splats never belong in a recipe, and
		// the parser recurses on them.
		case hclsyntax.TokenQuestion:
			return refuse("RCP-04", t.Range.Start.Byte, "a conditional may not stand in a recipe")
		case hclsyntax.TokenTemplateControl:
			return refuse("RCP-04", t.Range.Start.Byte, "a directive may not stand in a text of a recipe")
		case hclsyntax.TokenStar:
			return refuse("RCP-04", t.Range.Start.Byte, "the sign * may not stand in a recipe; amounts are multiplied by times(amount, number)")
		case hclsyntax.TokenDot:
			chain++
		case hclsyntax.TokenOBrack:
			if last == hclsyntax.TokenCBrack {
				chain++
			}
		case hclsyntax.TokenNewline, hclsyntax.TokenEqual, hclsyntax.TokenComma:
			chain = 0
		}
		if chain > mostUnary {
			return refuse("RCP-08", t.Range.Start.Byte, "more than %d indices in a row", mostUnary)
		}
		last = t.Type
		if t.Type == hclsyntax.TokenOBrace {
			if braces++; braces > mostBraces {
				return refuse("RCP-08", t.Range.Start.Byte, "the file has more than %d blocks", mostBraces)
			}
		}
		if t.Type == hclsyntax.TokenMinus || t.Type == hclsyntax.TokenBang || t.Type == hclsyntax.TokenQuestion {
			unary++
			if unary > mostUnary {
				return refuse("RCP-08", t.Range.Start.Byte, "more than %d operators in a row", mostUnary)
			}
		} else if t.Type != hclsyntax.TokenNewline {
			unary = 0
		}
	}
	return nil
}
