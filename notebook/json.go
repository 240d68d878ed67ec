package notebook

import (
	"bytes"
	"encoding/json"
	"math"
	"slices"
	"strconv"
	"strings"
	"unicode"

	"gusset/notebook/check"
	"gusset/notebook/diag"
	"gusset/notebook/eval"
	"gusset/notebook/syntax"
)

// The machine form of a calc. The order of the keys is fixed by the order of
// the fields.
type (
	sheetJSON struct {
		Calc        string      `json:"calc"`
		Rev         string      `json:"rev"`
		Title       string      `json:"title"`
		Values      []valueJSON `json:"values"`
		Checks      []checkJSON `json:"checks"`
		Diagnostics []diag.JSON `json:"diagnostics"`
	}
	valueJSON struct {
		Name      string          `json:"name"`
		Kind      string          `json:"kind"`
		Value     json.RawMessage `json:"value"`
		Unit      string          `json:"unit"`
		SI        json.RawMessage `json:"si"`
		Dimension string          `json:"dimension"`
		Text      json.RawMessage `json:"text"`
		Rows      []string        `json:"rows,omitempty"`
		Note      string          `json:"note"`
		Source    string          `json:"source"`
		Line      int             `json:"line"`
	}
	checkJSON struct {
		Text        string          `json:"text"`
		Note        string          `json:"note"`
		Source      string          `json:"source"`
		Utilisation json.RawMessage `json:"utilisation"`
		OK          bool            `json:"ok"`
		Governs     string          `json:"governs"`
		Required    *bool           `json:"required,omitempty"`
		Rows        []string        `json:"rows,omitempty"`
		Line        int             `json:"line"`
	}
)

// JSON returns the calc for a machine, one object on one line: values, checks
// and diagnostics. What failed is absent; the diagnostics say why.
func (s *Sheet) JSON() []byte {
	out := sheetJSON{
		Calc: s.Front.Calc, Rev: s.Front.Rev, Title: s.Front.Title,
		Values: []valueJSON{}, Checks: []checkJSON{}, Diagnostics: []diag.JSON{},
	}
	for _, b := range s.Blocks {
		for _, step := range b.Steps {
			switch {
			case step.Failed:
			case step.Kind == eval.Check:
				out.Checks = append(out.Checks, s.checkJSON(step))
			case len(step.Results) > 0:
				for _, r := range step.Results {
					out.Values = append(out.Values, s.valueJSON(r, step))
				}
			case step.Kind == eval.Given || step.Kind == eval.Computed || step.Kind == eval.Carried:
				v := s.valueJSON(step, step)
				if b.Tree.Table != nil { // a column's note and source are its table's
					v.Note, v.Source = b.Note, b.Source
				}
				out.Values = append(out.Values, v)
			}
		}
	}
	for _, d := range s.Diagnostics {
		out.Diagnostics = append(out.Diagnostics, d.JSON())
	}
	return compact(out)
}

// compact encodes without HTML's escapes, so that `<=` stays `<=`.
func compact(v any) []byte {
	var b bytes.Buffer
	e := json.NewEncoder(&b)
	e.SetEscapeHTML(false)
	if err := e.Encode(v); err != nil {
		panic(err) // every field is a string, a bool, an int or JSON made here
	}
	return bytes.TrimSuffix(b.Bytes(), []byte("\n"))
}

var kindWords = map[eval.StepKind]string{eval.Given: "given", eval.Computed: "computed", eval.Carried: "carried"}

// valueJSON lists a value; line is the step of the line it stands in.
func (s *Sheet) valueJSON(v, line *Step) valueJSON {
	j := valueJSON{
		Name: v.ID, Kind: kindWords[line.Kind], Unit: v.Unit.String(), Dimension: dimension(v.Value.Type),
		Rows: s.rowNames(v.Value.Type), Note: v.Note, Source: v.Source, Line: line.Line,
	}
	if v != line && v.Note == "" {
		j.Note, j.Source = line.Note, line.Source
	}
	if line.Origin != nil && j.Source == "" {
		j.Source = line.Origin.Name()
	}
	nested := func(entry func(b []byte, i int) []byte) json.RawMessage {
		return appendNested(nil, v.Value.Type.Rows, entry)
	}
	j.Text = nested(func(b []byte, i int) []byte { return appendString(b, eval.PlainText(v.Printed(i))) })
	if v.Value.Type.Kind == check.Text {
		j.Value = nested(func(b []byte, i int) []byte { return appendString(b, v.Value.Text[i]) })
		j.SI = nested(func(b []byte, _ int) []byte { return append(b, "null"...) })
		return j
	}
	j.Value = nested(func(b []byte, i int) []byte { return appendNumber(b, v.Unit.FromSI(v.Value.Num[i])) })
	if x, ok := ownFigures(v); ok {
		j.Value = appendNumber(nil, x)
	}
	j.SI = nested(func(b []byte, i int) []byte { return appendNumber(b, v.Value.Num[i]) })
	return j
}

// ownFigures is the number that the author gave, which the way through SI units
// and back may miss by the last bit.
func ownFigures(v *Step) (x float64, ok bool) {
	if v.Literal == nil || len(v.Literal.Pieces) != 1 || !v.Literal.Pieces[0].Unit.Equal(v.Unit) {
		return 0, false
	}
	r, err := v.Literal.Pieces[0].Rat()
	if err != nil {
		return 0, false
	}
	x, _ = r.Float64()
	if v.Literal.Neg != v.Negated {
		x = -x
	}
	return x, true
}

// dimension names what a value measures: the quantity, or the base units where
// it has no name.
func dimension(t check.Type) string {
	switch name := t.Dim.Name(); {
	case t.Kind == check.Text:
		return "text"
	case t.Kind == check.Point:
		return "temperature"
	case name != "":
		return name
	}
	return t.Dim.Base()
}

func (s *Sheet) checkJSON(step *Step) checkJSON {
	c := step.Check
	j := checkJSON{
		Text: s.checkText(step), Note: step.Note, Source: step.Source,
		OK: c.AllOK, Governs: c.Type.Mark(c.Governs), Rows: s.rowNames(c.Type), Line: step.Line,
	}
	if !slices.Contains(c.Required, true) {
		required := false
		j.Required, j.Governs = &required, ""
	}
	j.Utilisation = appendNested(nil, c.Type.Rows, func(b []byte, i int) []byte { return appendNumber(b, c.Ratio[i]) })
	return j
}

// rowNames are the sets of rows that a value runs over, as this calc calls them.
func (s *Sheet) rowNames(t check.Type) []string {
	var names []string
	for _, r := range t.Rows {
		names = append(names, s.RowsName(r))
	}
	return names
}

// RowsName is a set of rows as this calc calls it: under its file's key where it
// is carried.
func (s *Sheet) RowsName(r *check.Rows) string {
	if name, ok := s.carriedRows[r]; ok {
		return name
	}
	return r.Name
}

// appendNested writes one entry, or arrays of entries, the first set of rows
// outermost.
func appendNested(b []byte, rows []*check.Rows, entry func(b []byte, i int) []byte) []byte {
	next := 0
	var level func(b []byte, depth int) []byte
	level = func(b []byte, depth int) []byte {
		if depth == len(rows) {
			next++
			return entry(b, next-1)
		}
		b = append(b, '[')
		for i := range rows[depth].N() {
			if i > 0 {
				b = append(b, ',')
			}
			b = level(b, depth+1)
		}
		return append(b, ']')
	}
	return level(b, 0)
}

// appendNumber writes a number with all its precision; what does not exist is null.
func appendNumber(b []byte, x float64) []byte {
	switch size := math.Abs(x); {
	case math.IsNaN(x) || math.IsInf(x, 0):
		return append(b, "null"...)
	case x == 0:
		return append(b, '0')
	case size < 1e-6 || size >= 1e21:
		return strconv.AppendFloat(b, x, 'e', -1, 64)
	}
	return strconv.AppendFloat(b, x, 'f', -1, 64)
}

func appendString(b []byte, s string) []byte {
	for i := range len(s) {
		if c := s[i]; c < ' ' || c >= 0x7F || c == '"' || c == '\\' {
			return append(b, compact(s)...)
		}
	}
	return append(append(append(b, '"'), s...), '"')
}

// plainSigns spell a formula's signs as a keyboard has them.
var plainSigns = strings.NewReplacer("×", "*", "·", "*", "÷", "/", "−", "-", "≤", "<=", "≥", ">=", "≠", "!=")

// checkText is a check as it was written, in plain signs and with its names in
// their English spelling.
func (s *Sheet) checkText(step *Step) string {
	c, ok := step.Stmt.(*syntax.Check)
	if !ok {
		return ""
	}
	text := s.expressionText(c.Cond)
	if c.If != nil {
		text += " if " + s.expressionText(c.If)
	}
	return text
}

func (s *Sheet) expressionText(e syntax.Expr) string {
	english := map[string]string{}
	syntax.Walk(e, func(e syntax.Expr) bool {
		if n, ok := e.(*syntax.Name); ok && n != nil {
			english[n.Text] = n.ID
		}
		return true
	})
	isPart := func(r rune) bool {
		return unicode.IsLetter(r) || unicode.IsDigit(r) || strings.ContainsRune("_'.", r)
	}
	var b strings.Builder
	for i, part := range strings.Split(syntax.Print(s.Source, e), `"`) {
		if i > 0 {
			b.WriteByte('"')
		}
		if i%2 == 1 {
			b.WriteString(part)
			continue
		}
		part = plainSigns.Replace(part)
		for part != "" {
			word := part[:len(part)-len(strings.TrimLeftFunc(part, isPart))]
			part = part[len(word):]
			if id, ok := english[word]; ok {
				word = id
			}
			b.WriteString(word)
			other := strings.IndexFunc(part, isPart)
			if other < 0 {
				other = len(part)
			}
			b.WriteString(part[:other])
			part = part[other:]
		}
	}
	return b.String()
}

// Status is the exit status that compiled calcs stand for: 0 where all was
// computed and every check is OK, 1 where any has errors, else 3 where any check is NG.
func Status(sheets ...*Sheet) int {
	status := 0
	for _, s := range sheets {
		switch {
		case s.Failed():
			return 1
		case s.firstNG() != nil:
			status = 3
		}
	}
	return status
}
