package notebook

import (
	"bytes"
	"errors"
	"fmt"
	"regexp"
	"slices"
	"strconv"
	"strings"
	"unicode/utf8"

	"go.yaml.in/yaml/v3"

	"gusset/notebook/diag"
)

// maxFront bounds a front matter and a register.
const maxFront = 64 << 10

// yamlReader reads the keys of a front matter or a register. Every scalar is
// the text that the author wrote, whatever YAML would make of it.
type yamlReader struct {
	src   *diag.Source
	at    diag.Span // the YAML within src
	id    string    // of its diagnostics
	what  string    // "front matter" or "register"
	diags []diag.Diagnostic
}

// entry is a key with its value.
type entry struct {
	key   string
	keyAt diag.Span
	value *yaml.Node
}

func (y *yamlReader) report(severity diag.Severity, at diag.Span, message string, hints ...string) {
	y.diags = append(y.diags, diag.Diagnostic{Severity: severity, ID: y.id, Message: message, Hints: hints, Source: y.src, Span: at})
}

func (y *yamlReader) errorf(at diag.Span, format string, args ...any) {
	y.report(diag.Error, at, fmt.Sprintf(format, args...))
}

// entries parses the YAML. It returns nil where there is none to be had, and
// has said why.
func (y *yamlReader) entries() []entry {
	text := y.src.Text[y.at.Start:y.at.End]
	if len(text) > maxFront {
		y.diags = append(y.diags, diag.Diagnostic{
			ID: diag.BoundExceeded, Source: y.src, Span: diag.Span{Start: y.at.Start, End: y.at.Start + 1},
			Message: fmt.Sprintf("the %s may have %d kB at most", y.what, maxFront>>10),
		})
		return nil
	}
	var doc yaml.Node
	mended := map[int]bool{}
	for err := yaml.Unmarshal(text, &doc); err != nil; err = yaml.Unmarshal(text, &doc) {
		if text = y.mend(text, mended); text == nil {
			y.notYAML(err)
			return nil
		}
	}
	if doc.Kind == 0 {
		return []entry{}
	}
	// A list on a mended line is left out: its items are not where YAML has them.
	return slices.DeleteFunc(y.mapping(doc.Content[0], "the "+y.what), func(e entry) bool {
		return target(e.value).Kind == yaml.SequenceNode && mended[y.src.LineAt(e.keyAt.Start)]
	})
}

// maxMended bounds how often a text is parsed again.
const maxMended = 20

// mend reports the first text that needs quotes and has not been mended yet, and
// returns the YAML with it in quotes, its lines where they were, so that what is
// wrong in the other keys is found in the same run. nil says that there is none.
func (y *yamlReader) mend(text []byte, mended map[int]bool) []byte {
	first := y.src.LineAt(y.at.Start)
	lines := bytes.SplitAfter(text, []byte("\n"))
	for i, line := range lines {
		start, end, fixed := needsQuotes(string(line))
		if mended[first+i] || fixed == "" || len(mended) == maxMended {
			continue
		}
		at := y.src.LineStart(first + i)
		y.report(diag.Error, diag.Span{Start: at + start, End: at + end}, "the "+y.what+" is no YAML: this text needs quotes", "write `"+fixed+"`")
		mended[first+i] = true
		lines[i] = []byte(fixed + "\n")
		return bytes.Join(lines, nil)
	}
	return nil
}

// mapping returns the keys of a mapping, each once.
func (y *yamlReader) mapping(n *yaml.Node, what string) []entry {
	n = target(n)
	if n.Kind != yaml.MappingNode {
		y.report(diag.Error, y.span(n), what+" holds no keys", "write each as `key: value` on a line of its own")
		return nil
	}
	list := []entry{}
	first := map[string]int{}
	for i := 0; i+1 < len(n.Content); i += 2 {
		key := target(n.Content[i])
		at := y.span(n.Content[i])
		if key.Kind != yaml.ScalarNode {
			y.errorf(at, "a key of %s is a plain word", what)
			continue
		}
		if line, ok := first[key.Value]; ok {
			y.errorf(at, "`%s` is given twice, first in line %d", key.Value, line)
			continue
		}
		first[key.Value] = y.src.LineAt(at.Start)
		list = append(list, entry{key.Value, at, n.Content[i+1]})
	}
	return list
}

func target(n *yaml.Node) *yaml.Node {
	if n.Kind == yaml.AliasNode {
		return n.Alias
	}
	return n
}

// unknown warns of a key that nothing reads.
func (y *yamlReader) unknown(e entry, known []string) {
	hint := "the keys are " + strings.Join(known, ", ")
	if near := diag.Nearest(e.key, known); near != "" {
		hint = "did you mean `" + near + "`?"
	}
	y.report(diag.Warning, e.keyAt, fmt.Sprintf("`%s` is no key of the %s", e.key, y.what), hint)
}

// text reads a value that is one text. Line ends within become blanks.
func (y *yamlReader) text(key string, n *yaml.Node) string {
	v := target(n)
	if v.Kind != yaml.ScalarNode {
		y.errorf(y.span(n), "`%s` is a text, not a %s", key, kindName(v))
		return ""
	}
	if strings.IndexFunc(v.Value, func(r rune) bool { return hidden(r) || r == utf8.RuneError }) >= 0 {
		y.errorf(y.span(n), "`%s` holds a character that cannot be printed", key)
		return ""
	}
	text := strings.Join(strings.Fields(v.Value), " ")
	if c := n.LineComment; v.Style == 0 && len(c) > 1 && c[1] != ' ' && c[1] != '\t' {
		y.report(diag.Warning, y.span(n), fmt.Sprintf("`%s` is a comment here: the text ends before the number sign", c),
			fmt.Sprintf("write `%s: %s` to keep it", key, quote(text+" "+c)))
	}
	return text
}

// texts reads a list of texts with their places.
func (y *yamlReader) texts(key string, n *yaml.Node, example string) (list []string, at []diag.Span) {
	v := target(n)
	if v.Kind == yaml.ScalarNode && v.Value == "" {
		return nil, nil
	}
	if v.Kind != yaml.SequenceNode {
		y.report(diag.Error, y.span(n), fmt.Sprintf("`%s` is a list", key), "write it in square brackets: `"+example+"`")
		return nil, nil
	}
	for _, item := range v.Content {
		if v := target(item); v.Kind != yaml.ScalarNode {
			y.errorf(y.span(item), "each of `%s` is a text, not a %s", key, kindName(v))
		} else if text := y.text(key, item); text != "" {
			list, at = append(list, text), append(at, y.span(item))
		}
	}
	return list, at
}

func kindName(n *yaml.Node) string {
	if n.Kind == yaml.SequenceNode {
		return "list"
	}
	return "set of keys"
}

// quote puts a text into the quotes that YAML keeps it whole in.
func quote(text string) string {
	if strings.ContainsAny(text, `"\`) {
		return "'" + strings.ReplaceAll(text, "'", "''") + "'"
	}
	return `"` + text + `"`
}

// span is where a node stands. YAML tells its start; the end is found in the
// text, or is the end of the line.
func (y *yamlReader) span(n *yaml.Node) diag.Span {
	first := y.src.LineAt(y.at.Start)
	line := first + max(n.Line, 1) - 1
	start := y.src.LineStart(line)
	text := y.src.Line(line)
	column := 0
	for i := 1; i < n.Column && column < len(text); i++ {
		_, size := utf8.DecodeRuneInString(text[column:])
		column += size
	}
	rest := text[column:]
	size := len(strings.TrimRight(rest, " \t"))
	switch v := target(n); {
	case v.Kind != yaml.ScalarNode || n.Kind == yaml.AliasNode:
	case v.Value != "" && strings.HasPrefix(rest, v.Value):
		size = len(v.Value)
	case rest != "" && (rest[0] == '"' || rest[0] == '\''):
		if end := strings.IndexByte(rest[1:], rest[0]); end >= 0 {
			size = end + 2
		}
	case v.Value == "":
		size = 0
	}
	return diag.Span{Start: start + column, End: start + column + size}
}

// notYAML reports a fault of the YAML itself that no quotes mend.
func (y *yamlReader) notYAML(err error) {
	text := y.src.Text[y.at.Start:y.at.End]
	offset := y.at.Start
	for line := range bytes.Lines(text) {
		if indent := len(line) - len(bytes.TrimLeft(line, " \t")); bytes.IndexByte(line[:indent], '\t') >= 0 && indent < len(bytes.TrimRight(line, "\r\n")) {
			y.report(diag.Error, diag.Span{Start: offset, End: offset + indent}, "the "+y.what+" is no YAML: a tab may not indent a line", "indent with blanks")
			return
		}
		offset += len(line)
	}
	message, line := yamlMessage(err)
	n := &yaml.Node{Kind: yaml.MappingNode, Line: line, Column: 1}
	y.report(diag.Error, y.span(n), "the "+y.what+" is no YAML: "+message,
		"a text that holds any of `: # [ ] { } % @` goes in quotes")
}

// countsFromZero is what the parser finds wrong with the order of its tokens. It
// numbers these lines from zero, and those of all its other errors from one.
var countsFromZero = regexp.MustCompile(`^did not find expected (<|node content|key|'-' indicator|',' or)`)

// yamlMessage takes the line out of an error of the parser.
func yamlMessage(err error) (message string, line int) {
	var lists *yaml.TypeError
	message = strings.TrimPrefix(err.Error(), "yaml: ")
	if errors.As(err, &lists) && len(lists.Errors) > 0 {
		message = lists.Errors[0]
	}
	line = 1
	if rest, ok := strings.CutPrefix(message, "line "); ok {
		if number, words, ok := strings.Cut(rest, ": "); ok {
			if n, err := strconv.Atoi(number); err == nil {
				line, message = n, words
				if countsFromZero.MatchString(words) {
					line++
				}
			}
		}
	}
	return message, line
}

// needsQuotes looks at one line `key: value` whose value YAML cannot read as a
// text, and returns the place of the value and the line as it should be.
func needsQuotes(line string) (start, end int, fixed string) {
	line = strings.TrimRight(line, "\r\n")
	colon := strings.Index(line, ":")
	if colon <= 0 || colon+1 < len(line) && line[colon+1] != ' ' && line[colon+1] != '\t' {
		return 0, 0, ""
	}
	value := line[colon+1:]
	if i := strings.Index(value, " #"); i >= 0 {
		value = value[:i]
	}
	start = colon + 1 + len(value) - len(strings.TrimLeft(value, " \t"))
	value = strings.TrimSpace(value)
	end = start + len(value)
	key := strings.TrimSpace(line[:colon]) + ": "
	switch {
	case value == "" || strings.ContainsAny(value[:1], `"'{|>`):
		return 0, 0, ""
	case value[0] != '[':
		if plainFails(value) {
			return start, end, key + quote(value)
		}
	case strings.HasSuffix(value, "]"):
		items := strings.Split(value[1:len(value)-1], ",")
		found := false
		for i, item := range items {
			items[i] = strings.TrimSpace(item)
			if items[i] != "" && !strings.ContainsAny(items[i][:1], `"'`) && plainFails(items[i]) {
				items[i], found = quote(items[i]), true
			}
		}
		if found {
			return start, end, key + "[" + strings.Join(items, ", ") + "]"
		}
	}
	return 0, 0, ""
}

// plainFails tells whether a text without quotes is more than a text to YAML.
func plainFails(text string) bool {
	return strings.Contains(text, ": ") || strings.HasSuffix(text, ":") || strings.ContainsAny(text[:1], "%@`*&!]}")
}
