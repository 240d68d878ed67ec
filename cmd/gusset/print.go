package main

import (
	"fmt"
	"runtime"
	"sync/atomic"

	"github.com/spf13/cobra"

	"gusset/notebook/diag"
	"gusset/notebook/store"
)

func printCommand(t *terminal) *cobra.Command {
	var p printer
	cmd := &cobra.Command{
		Use:   "print PATH…",
		Short: "Write calcs as pages, HTML and PDF",
		Long: `print writes working copies of calc files as pages, named by the calc's number and
revision: C-104_B.html and C-104_B.pdf. A folder stands for every calc file in it. A calc
with errors is never written, and its old pages stay; the others are written all the same.

Exit status: 0 where all was written and every check is OK; 1 where a calc has errors;
2 where the command was misused or a path cannot be read or written; 3 where a check is NG.`,
		Example: "  gusset print lug.md\n  gusset print calcs --to out\n  gusset print calcs --to out --only pdf",
		Args:    onePathOrMore("one calc file or folder or more"),
		RunE: func(_ *cobra.Command, args []string) error {
			if err := p.check(); err != nil {
				return err
			}
			hugePages()
			return printPages(t, &p, args)
		},
	}
	p.flags(cmd)
	return cmd
}

// flags gives a command the printer's flags.
func (p *printer) flags(cmd *cobra.Command) {
	cmd.Flags().StringVar(&p.to, "to", "", "write into this folder; else beside each calc file")
	cmd.Flags().StringVar(&p.only, "only", "", "write only pdf or only html")
	_ = cmd.RegisterFlagCompletionFunc("only", func(*cobra.Command, []string, string) ([]string, cobra.ShellCompDirective) {
		return []string{"pdf", "html"}, cobra.ShellCompDirectiveNoFileComp
	})
	_ = cmd.MarkFlagDirname("to")
}

func printPages(t *terminal, p *printer, paths []string) error {
	var done outcome
	f := find(paths)
	for _, err := range f.problems {
		t.problem(err)
		done.unusable = true
	}
	results := compile(t, store.New(), f.files)
	stems, clashes := p.stems(results)
	pages := t.pages(p, results, stems)
	told := map[string]bool{} // a folder that cannot be written is told of once
	for i, r := range results {
		switch {
		case r.Err != nil:
			t.problem(r.Err)
			done.unusable = true
			continue
		case r.Sheet.Failed():
			t.diagnostics(r.Sheet, false)
			fmt.Fprintf(t.out, "%s: not written, it has errors\n", diag.Visible(r.File))
		default:
			t.diagnostics(r.Sheet, false)
			for _, w := range pages[i].warnings {
				t.diagnostic(w)
			}
			if len(pages[i].files) > 0 {
				fmt.Fprintf(t.out, "%s: %s → %s\n", diag.Visible(r.File), verdictLine(r.Sheet), names(pages[i].files))
			}
			if err := pages[i].err; err != nil {
				if done.unusable = true; !told[err.Error()] {
					t.problem(err)
				}
				told[err.Error()] = true
			}
		}
		done.sheets = append(done.sheets, r.Sheet)
	}
	for _, err := range clashes {
		t.problem(err)
		done.errors = true
	}
	return done.status()
}

// pages writes pages and shows how far it is where that takes long.
func (t *terminal) pages(p *printer, results []store.Result, stems []string) []written {
	total := 0
	for _, s := range stems {
		if s != "" {
			total++
		}
	}
	var n atomic.Int64
	if total > 1 {
		defer t.progress(func() string { return fmt.Sprintf("writing pages, %d of %d calcs …", n.Load(), total) })()
	}
	return p.writeAll(results, stems, func() { n.Add(1) })
}

func parallel() int { return runtime.GOMAXPROCS(0) }
