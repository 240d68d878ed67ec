package main

import (
	_ "embed"
	"errors"
	"fmt"
	"io/fs"
	"os"
	"path/filepath"
	"strings"
	"unicode"

	"github.com/spf13/cobra"

	"gusset/notebook"
	"gusset/notebook/diag"
)

// template is the calc that `gusset new` writes; NUMBER stands for its number.
//
//go:embed template.md
var template string

func newCommand(t *terminal) *cobra.Command {
	return &cobra.Command{
		Use:   "new FILE",
		Short: "Write a calc file to start from",
		Long: `new writes a small calc file that computes as it is, to be overwritten with your own.
Its number is taken from the file's name. A file that exists is never touched.`,
		Example: "  gusset new lug.md",
		Args:    between(1, 1, "the name of one file to write"),
		RunE: func(_ *cobra.Command, args []string) error {
			return newCalc(t, args[0])
		},
	}
}

func newCalc(t *terminal, file string) error {
	if !isMarkdown(file) {
		name := file
		if name == "" || os.IsPathSeparator(name[len(name)-1]) {
			name += "lug"
		}
		return fmt.Errorf("a calc file is Markdown: `gusset new %s`", shellWord(name+".md"))
	}
	base := filepath.Base(file)
	number := calcNumber(strings.TrimSuffix(base, filepath.Ext(base)))
	if number == "" {
		return fmt.Errorf("`%s` has no letter or figure to number the calc by", base)
	}
	out, err := os.OpenFile(file, os.O_WRONLY|os.O_CREATE|os.O_EXCL, 0o666)
	switch {
	case errors.Is(err, fs.ErrExist):
		return fmt.Errorf("%s: there is a file of this name, and it stays as it is", file)
	case errors.Is(err, fs.ErrNotExist):
		return fmt.Errorf("%s: there is no folder `%s`", file, strings.TrimSuffix(file, string(filepath.Separator)+base))
	case err != nil:
		return unwritable(file, err)
	}
	_, err = out.WriteString(strings.ReplaceAll(template, "NUMBER", number))
	if err = errors.Join(err, out.Close()); err != nil {
		return errors.Join(unwritable(file, err), os.Remove(file))
	}
	fmt.Fprintf(t.out, "wrote %s; next: `gusset run %s`\n", diag.Visible(file), shellWord(diag.Visible(file)))
	return nil
}

// calcNumber makes a calc's number of a file's name, within the bound that numbers have.
func calcNumber(name string) string {
	runes := []rune(fileName(name))
	return fileName(string(runes[:min(len(runes), notebook.MaxNumber)]))
}

// shellWord writes a file's name so that a shell takes it for one word, and this
// program for no flag.
func shellWord(file string) string {
	if strings.HasPrefix(file, "-") {
		file = "./" + file
	}
	if strings.IndexFunc(file, func(r rune) bool {
		return !unicode.IsLetter(r) && !unicode.IsDigit(r) && !strings.ContainsRune("/._-+,:@%", r)
	}) < 0 {
		return file
	}
	return "'" + strings.ReplaceAll(file, "'", `'\''`) + "'"
}
