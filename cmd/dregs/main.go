package main

import (
	"bufio"
	"errors"
	"fmt"
	"io"
	"os"
	"os/signal"
	"runtime/debug"
	"syscall"

	"github.com/fatih/color"
	"golang.org/x/term"

	"dregs/checks"
)

// version is set when a release is built: -ldflags "-X main.version=1.2.0".
var version = "development"

// Exit codes.
const (
	exitClear    = 0 // nothing at or above the level asked for
	exitFindings = 1
	exitUnusable = 2 // the input or the call cannot be used
)

// caution ends every output.
const caution = checks.Caution

func main() { os.Exit(run()) }

func run() int {
	// Short-lived and small: collecting rarely costs little memory and saves time,
	// until many recipes are checked at once.
	debug.SetGCPercent(400)
	debug.SetMemoryLimit(200 << 20)
	// A reader that goes away early (head, a pager) ends the output, not the verdict.
	signal.Ignore(syscall.SIGPIPE)
	buffered := bufio.NewWriterSize(os.Stdout, 1<<16)
	c := &call{in: os.Stdin, out: buffered, fault: os.Stderr, width: screenWidth(), colourable: !color.NoColor}
	code := c.main(os.Args[1:])
	if err := buffered.Flush(); err != nil && !errors.Is(err, syscall.EPIPE) {
		fmt.Fprintf(os.Stderr, "dregs: writing the output: %v\n", err)
		return exitUnusable
	}
	return code
}

// call is one run of the program.
type call struct {
	in         io.Reader
	out        io.Writer // findings and screens
	fault      io.Writer // what is wrong with the input or the call
	width      int
	colourable bool // standard output takes colour
	colour     string
	code       int
}

// faultf tells something wrong with the call and remembers it.
func (c *call) faultf(format string, args ...any) {
	fmt.Fprintln(c.fault, printable(fmt.Sprintf("dregs: "+format, args...)))
	c.code = exitUnusable
}

const (
	usualWidth = 80 // off a terminal, so that files look the same everywhere
	leastWidth = 60
	mostWidth  = 160
)

// screenWidth is that of the terminal; GetSize may say 0 without an error.
func screenWidth() int {
	width, _, err := term.GetSize(int(os.Stdout.Fd()))
	if err != nil || width <= 0 {
		return usualWidth
	}
	return min(max(width, leastWidth), mostWidth)
}
