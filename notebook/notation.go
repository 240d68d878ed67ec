package notebook

import (
	_ "embed"
	"strings"
)

//go:embed NOTATION.md
var notation string

// notationNames are the names of the reference's parts, in their order.
var notationNames = []string{
	"file", "calc", "given", "computed", "conditions", "checks", "functions", "helpers", "carried", "numbers", "units",
	"names", "expressions", "text", "schedules", "cases", "plots", "figures", "writing", "machine", "diagnostics",
}

// NotationPart is a part of the reference of the notation.
type NotationPart struct {
	Name  string // what the command line calls it: `checks`
	Title string // its heading
	Text  string // Markdown, with its heading
}

// Notation returns the reference of the notation: what stands before its parts,
// and the parts in order.
func Notation() (intro string, parts []NotationPart) {
	sections := strings.Split(notation, "\n## ")
	for i, text := range sections[1:] {
		title, _, _ := strings.Cut(text, "\n")
		parts = append(parts, NotationPart{Name: notationNames[i], Title: title, Text: "## " + strings.TrimSpace(text) + "\n"})
	}
	return strings.TrimSpace(sections[0]) + "\n", parts
}
