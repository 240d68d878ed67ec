// Command gusset compiles calc files, plain Markdown with assignments that know
// their units, into calculation packages as HTML and PDF.
//
//	gusset new lug.md                # a calc to start from
//	gusset run lug.md                # compute it and list what came out
//	gusset print lug.md --to out     # out/C-104_B.html and out/C-104_B.pdf
//	gusset watch calcs               # print again at every save
//
// The command line reads flags, calls the packages that do the work, and prints;
// each verb has a file of its own.
package main

import (
	"errors"
	"fmt"
	"os"
	"slices"
	"strings"

	"github.com/spf13/cobra"

	"gusset/notebook/diag"
)

// version is what --version prints. It is raised by hand with a release, so
// that one version always prints the same bytes.
const version = "1.0.0"

// The exit statuses. A calc that was computed and whose checks are all OK is 0.
const (
	statusErrors = 1 // a calc has errors
	statusMisuse = 2 // the command was misused, or a path it names cannot be used
	statusNG     = 3 // all was computed, and a check is NG
)

// status is an error that was reported already and only sets the exit status.
type status int

func (s status) Error() string { return fmt.Sprintf("exit status %d", int(s)) }

func main() {
	os.Exit(gusset(os.Args[1:], newTerminal(os.Stdout, os.Stderr)))
}

// gusset runs the program and returns its exit status.
func gusset(args []string, t *terminal) int {
	out := &output{to: t.out}
	t.out = out
	root := command(t)
	root.SetArgs(numbersAreValues(args))
	err := root.Execute()
	var s status
	switch {
	case out.err != nil:
		err = fmt.Errorf("the results cannot be written (%w)", cause(out.err))
	case err == nil:
		return 0
	case errors.As(err, &s):
		return int(s)
	}
	t.problem(err)
	return statusMisuse
}

func command(t *terminal) *cobra.Command {
	root := &cobra.Command{
		Use:   "gusset",
		Short: "Calculations in plain Markdown, checked for units, printed for signature",
		Long: `gusset compiles calc files, plain Markdown with assignments that know their units,
into calculation packages (HTML and PDF) that an engineer can check line by line and sign.`,
		Example:       "  gusset new lug.md\n  gusset run lug.md\n  gusset print lug.md --to out",
		Version:       version,
		SilenceErrors: true,
		SilenceUsage:  true,
		Args:          cobra.ArbitraryArgs,
		RunE: func(cmd *cobra.Command, args []string) error {
			if len(args) == 0 {
				return cmd.Help()
			}
			return unknownVerb(cmd, args[0])
		},
	}
	root.SetOut(t.out)
	root.SetErr(t.err)
	root.SetVersionTemplate("gusset {{.Version}}\n")
	root.SetFlagErrorFunc(func(cmd *cobra.Command, err error) error {
		return fmt.Errorf("%s\n`%s --help` shows what can be given", lowerFirst(err.Error()), cmd.CommandPath())
	})
	root.AddCommand(
		runCommand(t), printCommand(t), watchCommand(t), newCommand(t),
		notationCommand(t), helpersCommand(t), unitsCommand(t),
	)
	refuseUnknown(root)
	return root
}

// refuseUnknown has the commands that come with the library refuse a word that
// they do not know, where they would show their help as if nothing were wrong.
func refuseUnknown(root *cobra.Command) {
	root.InitDefaultHelpCmd()
	root.InitDefaultCompletionCmd()
	for _, c := range root.Commands() {
		switch c.Name() {
		case "help":
			show := c.Run
			c.Run, c.RunE = nil, func(cmd *cobra.Command, args []string) error {
				if found, _, err := root.Find(args); len(args) > 0 && (err != nil || found == root) {
					return unknownVerb(root, args[0])
				}
				show(cmd, args)
				return nil
			}
		case "completion":
			c.Args = between(0, 0, "the name of a shell")
			c.Example = "  gusset completion bash"
			c.RunE = func(cmd *cobra.Command, _ []string) error { return cmd.Help() }
		}
	}
}

func unknownVerb(root *cobra.Command, verb string) error {
	var verbs []string
	for _, c := range root.Commands() {
		verbs = append(verbs, c.Name())
	}
	if near := diag.Nearest(verb, verbs); near != "" {
		return fmt.Errorf("there is no command `%s`; did you mean `gusset %s`?", verb, near)
	}
	if strings.HasSuffix(verb, ".md") {
		return fmt.Errorf("`%s` is no command; `gusset run %s` computes the file", verb, verb)
	}
	return fmt.Errorf("there is no command `%s`; `gusset --help` lists them", verb)
}

// onePathOrMore wants one path or more, and says how the command goes otherwise. An empty
// one comes from a shell's variable that is not set.
func onePathOrMore(what string) cobra.PositionalArgs {
	some := between(1, -1, what)
	return func(cmd *cobra.Command, args []string) error {
		if slices.Contains(args, "") {
			return fmt.Errorf("a path given to `%s` is empty", cmd.CommandPath())
		}
		return some(cmd, args)
	}
}

// between wants a number of arguments; most is -1 where there may be any.
func between(least, most int, what string) cobra.PositionalArgs {
	return func(cmd *cobra.Command, args []string) error {
		if len(args) >= least && (most < 0 || len(args) <= most) {
			return nil
		}
		example, _, _ := strings.Cut(strings.TrimSpace(cmd.Example), "\n")
		return fmt.Errorf("`%s` takes %s, as in `%s`", cmd.CommandPath(), what, strings.TrimSpace(example))
	}
}

// numbersAreValues keeps `gusset units '-40 degC' degF` from being read as flags:
// no flag starts with a figure.
func numbersAreValues(args []string) []string {
	for i, a := range args {
		if a == "--" {
			break
		}
		if len(a) > 1 && a[0] == '-' && (a[1] >= '0' && a[1] <= '9' || a[1] == '.') {
			return append(append(args[:i:i], "--"), args[i:]...)
		}
	}
	return args
}

func lowerFirst(s string) string {
	if s == "" {
		return s
	}
	return strings.ToLower(s[:1]) + s[1:]
}
