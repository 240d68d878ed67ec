package diag

import (
	"bytes"
	"sort"
	"sync"
	"unicode/utf8"
)

// Source is a file's name, as the user should see it, and its text, valid
// UTF-8 without a byte-order mark. Its text never changes.
type Source struct {
	Name string
	Text []byte

	once  sync.Once
	lines []int // offset of each line's first byte
}

// NewSource returns the source of a file. A leading byte-order mark is
// stripped: offsets and columns count from the first byte behind it.
func NewSource(name string, text []byte) *Source {
	return &Source{Name: name, Text: bytes.TrimPrefix(text, []byte("\xef\xbb\xbf"))}
}

func (s *Source) index() []int {
	s.once.Do(func() {
		s.lines = append(s.lines, 0)
		for i, b := range s.Text {
			if b == '\n' {
				s.lines = append(s.lines, i+1)
			}
		}
	})
	return s.lines
}

// Position returns the line and the column of a byte offset, both from 1. The
// column counts Unicode code points.
func (s *Source) Position(offset int) (line, column int) {
	offset = min(max(offset, 0), len(s.Text))
	lines := s.index()
	n := sort.SearchInts(lines, offset+1) - 1
	return n + 1, utf8.RuneCount(s.Text[lines[n]:offset]) + 1
}

// LineAt returns the number of the line that holds the offset, from 1.
func (s *Source) LineAt(offset int) int {
	line, _ := s.Position(offset)
	return line
}

// Line returns the text of a line (from 1) without its line ending, "" where
// there is no such line.
func (s *Source) Line(n int) string {
	lines := s.index()
	if n < 1 || n > len(lines) {
		return ""
	}
	end := len(s.Text)
	if n < len(lines) {
		end = lines[n] - 1
	}
	return string(bytes.TrimSuffix(s.Text[lines[n-1]:end], []byte("\r")))
}

// LineStart returns the offset of a line's first byte; lines count from 1.
func (s *Source) LineStart(n int) int {
	lines := s.index()
	n = min(max(n, 1), len(lines))
	return lines[n-1]
}

// Slice returns the text a span covers.
func (s *Source) Slice(sp Span) string {
	a := min(max(sp.Start, 0), len(s.Text))
	b := min(max(sp.End, a), len(s.Text))
	return string(s.Text[a:b])
}
