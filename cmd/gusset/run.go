package main

import (
	"errors"
	"fmt"
	"io"
	"strings"

	"github.com/spf13/cobra"

	"gusset/notebook"
	"gusset/notebook/diag"
	"gusset/notebook/eval"
	"gusset/notebook/store"
	"gusset/notebook/syntax"
)

func runCommand(t *terminal) *cobra.Command {
	var r runner
	cmd := &cobra.Command{
		Use:   "run FILE…",
		Short: "Compute calc files and list what came out",
		Long: `run computes calc files and lists their values, with units and notes, and their checks,
with utilisation and OK or NG. Diagnostics go to standard error.

Exit status: 0 where all was computed and every check is OK; 1 where a calc has errors;
2 where the command was misused or a file cannot be read; 3 where a check is NG.`,
		Example: "  gusset run lug.md\n  gusset run --json loads.md lug.md > results.jsonl",
		Args:    onePathOrMore("one calc file or more"),
		RunE: func(_ *cobra.Command, args []string) error {
			return r.run(t, args)
		},
	}
	cmd.Flags().BoolVar(&r.json, "json", false, "print one JSON object for each file, each on a line")
	cmd.Flags().BoolVar(&r.notes, "notes", false, "list the notes too: givens without a source, values that nothing uses")
	cmd.Flags().StringVar(&r.stage, "stage", "", "print a stage of the compilation instead: "+stageNames())
	_ = cmd.RegisterFlagCompletionFunc("stage", func(*cobra.Command, []string, string) ([]string, cobra.ShellCompDirective) {
		return strings.Split(stageNames(), ", "), cobra.ShellCompDirectiveNoFileComp
	})
	return cmd
}

type runner struct {
	json, notes bool
	stage       string
}

// A stage prints what one phase of the compilation made of a calc.
type stage struct {
	name  string
	print func(w io.Writer, s *notebook.Sheet) error
}

var stages = []stage{{"tree", printTree}, {"steps", printSteps}}

func stageNames() string {
	var names []string
	for _, s := range stages {
		names = append(names, s.name)
	}
	return strings.Join(names, ", ")
}

func (r *runner) run(t *terminal, files []string) error {
	if r.json && r.stage != "" {
		return errors.New("`--json` and `--stage` print different things: give one of them")
	}
	write := r.list
	if r.json {
		write = func(w *terminal, s *notebook.Sheet) error {
			_, err := w.out.Write(append(s.JSON(), '\n'))
			return err
		}
	}
	if r.stage != "" {
		found := false
		for _, s := range stages {
			if s.name == r.stage {
				found = true
				write = func(w *terminal, sheet *notebook.Sheet) error { return s.print(w.out, sheet) }
			}
		}
		if !found {
			return fmt.Errorf("there is no stage `%s`; the stages are %s", r.stage, stageNames())
		}
	}
	var done outcome
	for _, result := range compile(t, store.New(), files) {
		if result.Err != nil {
			t.problem(hint(result.Err))
			done.unusable = true
			continue
		}
		done.sheets = append(done.sheets, result.Sheet)
	}
	for i, sheet := range done.sheets {
		if i > 0 && !r.json {
			fmt.Fprintln(t.out)
		}
		if err := write(t, sheet); err != nil {
			return err
		}
		if !r.json {
			t.diagnostics(sheet, r.notes)
		}
	}
	return done.status()
}

// list prints a calc's listing.
func (r *runner) list(t *terminal, s *notebook.Sheet) error {
	_, err := io.WriteString(t.out, listing(s, t.colour))
	return err
}

// compile compiles files, all at once, and says so where it takes long. A value
// that another of the files uses is used.
func compile(t *terminal, s *store.Store, files []string) []store.Result {
	if len(files) > 1 {
		defer t.progress(func() string { return fmt.Sprintf("computing %d calc files …", len(files)) })()
	}
	results := s.Compile(files)
	var read []*store.Result
	var sheets []*notebook.Sheet
	for i := range results {
		if results[i].Err == nil {
			read, sheets = append(read, &results[i]), append(sheets, results[i].Sheet)
		}
	}
	for i, sheet := range notebook.Together(sheets) {
		read[i].Sheet = sheet
	}
	return results
}

// hint adds to an error what can be done about it.
func hint(err error) error {
	if strings.HasSuffix(err.Error(), ": it is a folder") {
		return fmt.Errorf("%w; `gusset print` and `gusset watch` take folders, `gusset run` takes files", err)
	}
	return err
}

// outcome gathers what sets the exit status of a command.
type outcome struct {
	sheets   []*notebook.Sheet
	unusable bool // a path named on the command line cannot be read or written
	errors   bool // something else that counts as an error of a calc
}

// status returns the exit status as an error, nil for 0.
func (o *outcome) status() error {
	n := notebook.Status(o.sheets...)
	switch {
	case o.unusable:
		n = statusMisuse
	case o.errors:
		n = statusErrors
	}
	if n == 0 {
		return nil
	}
	return status(n)
}

// printTree prints the trees of a calc's blocks.
func printTree(w io.Writer, s *notebook.Sheet) error {
	for _, b := range s.Blocks {
		if b.Tree == nil {
			continue
		}
		if _, err := fmt.Fprintf(w, "line %d: ", s.Source.LineAt(b.Tree.At.Start)); err != nil {
			return err
		}
		if err := syntax.Dump(w, b.Tree); err != nil {
			return err
		}
	}
	return nil
}

var stepKinds = map[eval.StepKind]string{
	eval.Given: "given", eval.Computed: "computed", eval.Carried: "carried", eval.Check: "check", eval.Function: "function",
}

// printSteps prints what every statement came to: its kind, its dimension and
// rows, its value in SI and the names it uses.
func printSteps(w io.Writer, s *notebook.Sheet) error {
	for _, step := range s.Steps {
		kind, ok := stepKinds[step.Kind]
		if !ok {
			continue
		}
		for _, one := range append([]*notebook.Step{step}, step.Results...) {
			if _, err := fmt.Fprintf(w, "line %d: %s %s\n", step.Line, kind, stepText(one)); err != nil {
				return err
			}
		}
	}
	return nil
}

func stepText(s *notebook.Step) string {
	var b strings.Builder
	b.WriteString(s.ID)
	switch c := s.Check; {
	case s.Failed:
		fmt.Fprintf(&b, " not computed, see line %d", s.Because)
	case c != nil:
		fmt.Fprintf(&b, "(%s)%s: ok %v, ratio %s", s.Number, rowsText(c.Type), c.AllOK, numbers(c.Type, c.Ratio))
	case s.Kind == eval.Function:
	case len(s.Value.Text) > 0:
		fmt.Fprintf(&b, ": text%s %q", rowsText(s.Value.Type), s.Value.Text)
	case len(s.Value.Num) > 0:
		t := s.Value.Type
		fmt.Fprintf(&b, ": %s%s %s %s", t.Dim.Words(), rowsText(t), numbers(t, s.Value.Num), t.Dim.Base())
	}
	var uses []string
	for _, u := range s.Uses {
		if u != nil {
			uses = append(uses, u.ID)
		}
	}
	if len(uses) > 0 {
		b.WriteString(", uses " + strings.Join(uses, " "))
	}
	return diag.Visible(strings.TrimRight(b.String(), " "))
}

// numbers writes one number, or a list over rows.
func numbers(t notebook.Type, list []float64) string {
	if len(t.Rows) == 0 && len(list) == 1 {
		return fmt.Sprint(list[0])
	}
	return fmt.Sprint(list)
}

func rowsText(t notebook.Type) string {
	var b strings.Builder
	for _, r := range t.Rows {
		b.WriteString(" over " + r.Name)
	}
	return b.String()
}
