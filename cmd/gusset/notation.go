package main

import (
	"fmt"
	"io"
	"strings"

	"github.com/spf13/cobra"

	"gusset/notebook"
	"gusset/notebook/diag"
)

func notationCommand(t *terminal) *cobra.Command {
	_, parts := notebook.Notation()
	var names []string
	for _, p := range parts {
		names = append(names, p.Name)
	}
	return &cobra.Command{
		Use:   "notation [PART]",
		Short: "Print the reference of the notation, or one part of it",
		Long: "notation prints the reference of the notation that calc files are written in. Its parts:\n" +
			wrapped(names),
		Example:   "  gusset notation checks\n  gusset notation | less",
		Args:      between(0, 1, "the name of one part, or none for the whole"),
		ValidArgs: names,
		RunE: func(_ *cobra.Command, args []string) error {
			text, err := notation(strings.Join(args, ""))
			if err == nil {
				_, err = io.WriteString(t.out, text)
			}
			return err
		},
	}
}

// wrapped lists words in lines that fit a terminal.
func wrapped(words []string) string {
	var b strings.Builder
	width := 0
	for i, w := range words {
		switch {
		case i == 0:
			width = len(w)
		case width+len(w) > 80:
			b.WriteString(",\n")
			width = len(w)
		default:
			b.WriteString(", ")
			width += len(w) + 2
		}
		b.WriteString(w)
	}
	return b.String()
}

// notation is the reference, or a part of it by its name or its heading.
func notation(name string) (string, error) {
	intro, parts := notebook.Notation()
	var names, texts []string
	for _, p := range parts {
		if strings.EqualFold(name, p.Name) || strings.EqualFold(name, p.Title) {
			return p.Text, nil
		}
		names, texts = append(names, p.Name), append(texts, p.Text)
	}
	if name == "" {
		return intro + "\n" + strings.Join(texts, "\n"), nil
	}
	if near := diag.Nearest(name, names); near != "" {
		return "", fmt.Errorf("the notation has no part `%s`; did you mean `%s`?", name, near)
	}
	return "", fmt.Errorf("the notation has no part `%s`; its parts are\n%s", name, wrapped(names))
}
