package main

import (
	"fmt"
	"io"
	"os"
	"strings"
	"sync"
	"time"

	"golang.org/x/term"

	"gusset/notebook"
	"gusset/notebook/diag"
)

// terminal is where the program prints: results to out, diagnostics and
// progress to err.
type terminal struct {
	out, err io.Writer
	colour   style // of out
	alarm    style // of err
	live     bool  // err is a terminal, on which a line of progress may stand
	// told are the diagnostics shown of files that several calcs may share: a
	// register, a file of helpers, a table.
	told map[string]bool
}

func newTerminal(out, err *os.File) *terminal {
	return &terminal{out: out, err: err, colour: styleOf(out), alarm: styleOf(err), live: isTerminal(err)}
}

func isTerminal(f *os.File) bool { return term.IsTerminal(int(f.Fd())) }

// output is a stream that remembers the first error, so that no command has to
// look at every line that it prints.
type output struct {
	to  io.Writer
	err error
}

func (o *output) Write(text []byte) (int, error) {
	if o.err != nil {
		return 0, o.err
	}
	n, err := o.to.Write(text)
	o.err = err
	return n, err
}

// style tells whether a stream is coloured.
type style bool

// styleOf colours a terminal, unless its user or its kind will have none of it.
func styleOf(f *os.File) style {
	return style(os.Getenv("NO_COLOR") == "" && os.Getenv("TERM") != "dumb" && isTerminal(f))
}

// The colours, as a terminal's palette has them.
const (
	bold   = "1"
	red    = "31;1"
	green  = "32"
	yellow = "33"
	faint  = "2"
)

func (s style) paint(code, text string) string {
	if !s || text == "" {
		return text
	}
	return "\x1b[" + code + "m" + text + "\x1b[0m"
}

// problem prints what is wrong with the command line or a path.
func (t *terminal) problem(err error) {
	first, rest, more := strings.Cut(diagSafe(err.Error()), "\n")
	fmt.Fprintln(t.err, t.alarm.paint(red, "gusset:")+" "+first)
	if more {
		fmt.Fprintln(t.err, "   "+strings.ReplaceAll(rest, "\n", "\n   "))
	}
}

// diagSafe cleans a text of several lines of what could steer a terminal.
func diagSafe(s string) string {
	lines := strings.Split(s, "\n")
	for i, l := range lines {
		lines[i] = diag.Visible(l)
	}
	return strings.Join(lines, "\n")
}

// diagnostics prints a calc's diagnostics, and how many there are. Notes are
// only counted unless they are asked for, and so is what was told with another
// calc, of a file that they share.
func (t *terminal) diagnostics(s *notebook.Sheet, notes bool) {
	var count [3]int
	for _, d := range s.Diagnostics {
		count[d.Severity]++
		if d.Severity < diag.Note || notes {
			t.diagnosticOf(s, d)
		}
	}
	if line := counts(count, notes); line != "" {
		fmt.Fprintf(t.err, "%s: %s\n", diag.Visible(s.Source.Name), line)
	}
}

// counts says how many diagnostics there are: `1 error, 2 warnings`.
func counts(count [3]int, listed bool) string {
	var parts []string
	for severity, n := range count {
		if n > 0 {
			parts = append(parts, plural(n, diag.Severity(severity).String()))
		}
	}
	line := strings.Join(parts, ", ")
	if count[diag.Note] > 0 && !listed {
		line += " (`gusset run --notes` lists notes)"
	}
	return line
}

func plural(n int, word string) string {
	if n == 1 {
		return "1 " + word
	}
	return fmt.Sprintf("%d %ss", n, word)
}

// diagnosticOf prints a diagnostic of a calc, unless it is of a file that the
// calc shares with another, with which it was told.
func (t *terminal) diagnosticOf(s *notebook.Sheet, d diag.Diagnostic) {
	if d.Source != nil && d.Source.Name != s.Source.Name {
		text := d.Text()
		if t.told[text] {
			return
		}
		if t.told == nil {
			t.told = map[string]bool{}
		}
		t.told[text] = true
	}
	t.diagnostic(d)
}

// forget forgets what was told: a new build tells it again.
func (t *terminal) forget() { t.told = nil }

// diagnostic prints one diagnostic: its place bold, the mark under the source
// in the colour of its severity.
func (t *terminal) diagnostic(d diag.Diagnostic) {
	text := diagSafe(d.Text())
	if t.alarm {
		code := [...]string{red, yellow, faint}[d.Severity]
		lines := strings.Split(text, "\n")
		if place, message, ok := strings.Cut(lines[0], ": "); ok {
			lines[0] = t.alarm.paint(bold, place+":") + " " + message
		}
		if len(lines) > 2 && strings.HasPrefix(lines[2], "      | ") {
			lines[2] = lines[2][:len("      | ")] + t.alarm.paint(code, lines[2][len("      | "):])
		}
		text = strings.Join(lines, "\n")
	}
	fmt.Fprint(t.err, text)
}

// patience is how long a command may work before it says what it does.
const patience = time.Second

// progress shows on a terminal what takes longer than a second, in a line that
// is gone at the end. It returns the end.
func (t *terminal) progress(what func() string) (end func()) {
	if !t.live {
		return func() {}
	}
	done := make(chan struct{})
	var shown sync.WaitGroup
	shown.Go(func() {
		tick := time.NewTimer(patience)
		defer tick.Stop()
		wrote := false
		for {
			select {
			case <-done:
				if wrote {
					fmt.Fprint(t.err, "\r\x1b[K")
				}
				return
			case <-tick.C:
				fmt.Fprint(t.err, "\r\x1b[K"+what())
				wrote = true
				tick.Reset(patience / 5)
			}
		}
	})
	return func() { close(done); shown.Wait() }
}
