package recipe

// Range is a place in a file: from the first byte to the one behind the last.
// Lines and columns count from 1; columns count characters as a person sees
// them.
type Range struct {
	File                             string
	Line, Column, EndLine, EndColumn int
	Byte, EndByte                    int
}

// Level is how much a finding or problem matters. The zero value is not valid.
type Level int

const (
	_ Level = iota
	Note
	Caution
	Stop
)

func (l Level) String() string {
	switch l {
	case Note:
		return "note"
	case Caution:
		return "caution"
	case Stop:
		return "stop"
	}
	return "unknown"
}

// Problem is something wrong with the text of a recipe. Problems that make the
// recipe unusable (Fatal) end in exit code 2; the others (an unused material,
// an expired waiver) are findings of the RCP family.
type Problem struct {
	Code     string // RCP-01 ...
	Level    Level
	Fatal    bool
	Message  string // one sentence: what is wrong
	Expected string // what would be right; "" when the message says it
	Nearest  string // the nearest right spelling, "" if none is near
	At       Range
}
