package maths

import (
	"slices"
	"strconv"
)

// CSS is the style sheet that the MathML of this package is written for. It
// expects the families "Plex Serif" and "Plex Math".
//
// Letters and figures come from the text face, everything that grows from the
// math face. A chain is a row of boxes that wraps before relations, and a box
// too long for the column wraps before its operators, hung under its first
// right side. Two right sides that surely do not stand on one line have a line
// each, so that the chain's last baseline is that of its last line. The tip of a link stands at the foot of the window, where no
// scrolling formula can cut it off.
const CSS = `math{font-family:"Plex Math","Plex Serif",serif}
math :is(mi,mn,mtext){font-family:"Plex Serif",serif}
math mi{font-style:italic;text-transform:none}
math mi.f{font-style:normal}
math .g{font-weight:600}
math mn.l{line-height:0}
math a{color:inherit;text-decoration:none}
math a:is(:hover,:focus){text-decoration:underline;text-decoration-thickness:.06em;text-underline-offset:.2em}
math mtd{text-align:left;padding:.28em .5em .28em 0}
math mtd:first-child{padding-left:.25em}
.chain,.chain>span,.chain>span>span{display:flex;align-items:baseline}
.chain>span,.chain>span>span{flex-wrap:wrap;row-gap:.35em;min-width:0}
.chain>span{flex:1}
.chain>span>span{padding-left:1.5em}
.chain>span>span>:first-child{margin-left:-1.5em}
.chain .w{min-width:0;overflow-wrap:anywhere}
.chain .w:first-child{margin-left:0;text-indent:-1.5em}
.chain .w a{color:inherit}
.chain .b{flex-basis:100%}
.chain.two{display:grid;grid-template-columns:auto minmax(0,1fr);row-gap:.35em}
.two>span{display:contents}
.two>span>span{grid-column:2}
.two>span>span:last-child{align-self:last baseline}
@media print,screen and (min-width:761px){.s9{font-size:.9em}.s8{font-size:.8em}.s7{font-size:.7em}}
@media screen{.chain{overflow-x:auto;overflow-y:hidden}
[data-tip]:is(:hover,:focus)::after{content:attr(data-tip);position:fixed;left:1em;bottom:1em;max-width:calc(100vw - 2em);padding:.4em .8em;background:#16202c;color:#fff;font:normal 14px/1.4 "Plex Serif",serif;white-space:pre-line;border-radius:3px;z-index:9}}
`

// AppendMathML appends a node as one formula within a line of text.
func AppendMathML(dst []byte, n Node) []byte {
	w := markup{b: dst}
	w.raw("<math>")
	w.row(n, Open)
	w.raw("</math>")
	return w.b
}

// AppendChain appends a formula on a line of its own, made of parts between
// which a browser can break it. Its column is that many ems wide.
func AppendChain(dst []byte, c Chain, column float64) []byte {
	w := markup{b: dst, room: column - partHang}
	var room [16]Node
	led := leads(c.Left)
	if led && stacked(c, column) {
		w.raw(`<span class="chain two">`)
	} else {
		w.raw(`<span class="chain">`)
	}
	if led {
		w.math(atoms(room[:0], c.Left), Open)
		w.room -= leftWidth * float64(width(c.Left))
		w.raw("<span>")
	} else {
		w.raw("<span>")
		if c.Left != nil {
			w.step(atoms(room[:0], c.Left), false)
		}
	}
	for i, s := range c.Steps {
		after := i > 0 && endsInChoice(c.Steps[i-1].Right)
		w.step(atoms(append(room[:0], relation(s.Sign)), s.Right), after)
	}
	w.raw("</span></span>")
	return w.b
}

// stacked reports whether the second of two right sides stands below the first
// for sure, so that the page may place what belongs to the last line: a browser
// that has wrapped a line itself does not tell where its last one stands.
func stacked(c Chain, column float64) bool {
	if len(c.Steps) != 2 {
		return false
	}
	if endsInChoice(c.Steps[0].Right) {
		return true
	}
	var room [16]Node
	list := atoms(room[:0], c.Left)
	for _, s := range c.Steps {
		list = atoms(append(list, relation(s.Sign)), s.Right)
	}
	// Formulas are 0.36 to 0.62 ems a character wide, most of them about 0.42:
	// what that decides needs no measuring.
	n := float64(length(list))
	return 0.62*n > column && (0.36*n > column || ems(list) > column && measure(list) > column)
}

// leads reports whether a left side is short enough to set the rest beside it.
func leads(left Node) bool {
	if width(left) > shortStep/2 {
		return false
	}
	switch left := left.(type) {
	case Symbol, Number, Word, Text, Script:
		return true
	case Row: // a call of a function
		return len(left) == 2 && left[0] != nil
	}
	return false
}

// A markup writes MathML Core.
type markup struct {
	b    []byte
	room float64 // for a part of a chain, in ems
}

func (w *markup) raw(s string) { w.b = append(w.b, s...) }

// text appends character data or a part of an attribute.
func (w *markup) text(s string) { w.b = AppendText(w.b, s) }

// math writes atoms as one formula, smaller where they are longer than their
// room.
func (w *markup) math(list []Node, prev Class) {
	if slices.ContainsFunc(list, isLongText) {
		w.wrapped(list, prev)
		return
	}
	w.raw(`<math displaystyle="true"`)
	switch k := w.shrink(list); {
	case k < 0.8:
		w.raw(` class="s7"`)
	case k < 0.9:
		w.raw(` class="s8"`)
	case k < 1:
		w.raw(` class="s9"`)
	}
	w.raw(">")
	w.list(list, prev, true)
	w.raw("</math>")
}

// isLongText reports whether a node is a text of many words, which has to wrap
// as prose does; within a formula it could not.
func isLongText(n Node) bool {
	t, ok := n.(Text)
	return ok && len(t.Text) > shortStep
}

// wrapped writes atoms as a line of prose with formulas about its long texts.
func (w *markup) wrapped(list []Node, prev Class) {
	w.raw(`<span class="w">`)
	for len(list) > 0 {
		if t, ok := list[0].(Text); ok && isLongText(t) {
			w.anchor(t.Ref)
			w.text(t.Text)
			if t.Ref.leads() {
				w.raw("</a>")
			}
			list = list[1:]
			prev = Ord
			continue
		}
		n := slices.IndexFunc(list, isLongText)
		if n < 0 {
			n = len(list)
		}
		w.math(list[:n], prev)
		_, prev = list[n-1].edges()
		list = list[n:]
		if prev == Rel {
			w.raw(" ")
		}
	}
	w.raw("</span>")
}

// row writes a node as children of an element that groups by itself.
func (w *markup) row(n Node, prev Class) {
	switch one := n.(type) {
	case nil:
	case Row:
		var room [12]Node
		w.list(atoms(room[:0], n), prev, false)
	case Op:
		w.operator(one, prev, false)
	default:
		w.node(n)
	}
}

// list writes atoms side by side. Where the list goes on a formula that was
// parted, its first operator keeps the form it has between two terms.
func (w *markup) list(list []Node, prev Class, parted bool) {
	for i, n := range list {
		left, right := n.edges()
		if o, ok := n.(Op); ok {
			w.operator(o, prev, i == 0 && parted)
		} else {
			if prev == Func && i > 0 && apart(list[i-1], n) && gap(prev, left, false) > 0 {
				w.space(Thin)
			}
			w.node(n)
			if i+1 < len(list) || parted {
				w.lean(n)
			}
		}
		prev = right
	}
}

// lean writes the room that a slanted letter needs to stay clear of what
// follows it.
func (w *markup) lean(n Node) {
	s, ok := n.(Symbol)
	if !ok || len(s.Sub) > 0 || s.Primes > 0 {
		return
	}
	if letters, figs := split(s.Head); figs == "" {
		if lean := overhang(letters) / 10; lean >= leastLean {
			w.blank(lean)
		}
	}
}

// apart reports whether the space between a function's name and its argument
// has to be written: a browser sets sin and θ as if they were one word.
func apart(left, right Node) bool {
	_, operator := left.(Op)
	_, space := right.(Space)
	return !operator && !space
}

// operator writes an operator in the form that its place asks for.
func (w *markup) operator(o Op, prev Class, parted bool) {
	switch {
	case signs(o, prev), o.Class == Open:
		w.op(o, "prefix")
	case o.Class == Close:
		w.op(o, "postfix")
	case parted && o.Class != Ord:
		w.op(o, "infix")
	default:
		w.op(o, "")
	}
}

func (w *markup) op(o Op, form string) {
	if o.Sign == Beside.Sign {
		w.space(Thin)
		return
	}
	w.raw("<mo")
	switch {
	case o.Class == Func:
		w.raw(` lspace="0" rspace=".17em"`)
	case o.Sign == Slash.Sign:
		w.raw(` lspace="0" rspace="0"`)
	}
	if form != "" {
		w.raw(` form="`)
		w.raw(form)
		w.raw(`"`)
	}
	if o.Class == Open || o.Class == Close {
		w.raw(` stretchy="false"`)
	}
	w.raw(">")
	w.text(o.Sign)
	w.raw("</mo>")
}

var thins = [...]string{Thin: ".17em", Blank: ".28em", Quad: "1em"}

func (w *markup) space(s Space) {
	if s > 0 && int(s) < len(thins) && thins[s] != "" {
		w.raw(`<mspace width="`)
		w.raw(thins[s])
		w.raw(`"/>`)
		return
	}
	w.blank((max(int(s), 0)*100 + 9) / 18)
}

// blank writes a space in hundredths of an em.
func (w *markup) blank(hundredths int) {
	w.raw(`<mspace width="`)
	w.hundredths(hundredths)
	w.raw(`"/>`)
}

// hundredths writes a length in hundredths of an em, none below 0.
func (w *markup) hundredths(n int) {
	n = max(n, 0)
	w.b = strconv.AppendInt(w.b, int64(n/100), 10)
	w.b = append(w.b, '.', '0'+byte(n/10%10), '0'+byte(n%10))
	w.raw("em")
}

// single writes a node as exactly one element, as scripts and fractions need.
func (w *markup) single(n Node) {
	switch row := n.(type) {
	case nil:
		w.raw("<mrow></mrow>")
	case Row:
		if len(row) == 1 {
			w.single(row[0])
			return
		}
		w.raw("<mrow>")
		w.row(n, Open)
		w.raw("</mrow>")
	default:
		w.node(n)
	}
}

// node writes one atom as one element.
func (w *markup) node(n Node) {
	switch n := n.(type) {
	case Row:
		w.single(n)
	case Symbol:
		w.symbol(n, nil)
	case Number:
		w.link(n.Ref)
		w.number(n)
		w.unlink(n.Ref)
	case Unit:
		w.raw("<mrow>")
		w.unit(n)
		w.raw("</mrow>")
	case Word:
		w.link(n.Ref)
		w.tag(`<mi class="f`, n.Governs, n.Text, "</mi>")
		w.unlink(n.Ref)
	case Text:
		w.link(n.Ref)
		w.tag(`<mtext class="t`, n.Governs, n.Text, "</mtext>")
		w.unlink(n.Ref)
	case Op:
		w.op(n, "")
	case Space:
		w.space(n)
	case Fraction:
		w.raw("<mfrac>")
		w.single(n.Num)
		w.single(n.Den)
		w.raw("</mfrac>")
	case Script:
		w.script(n)
	case Root:
		w.root(n)
	case Fence:
		w.fence(n)
	case strut:
		w.strut(n)
	case Choice:
		w.choice(n)
	}
}

// tag writes a token whose first tag is open, up to the class.
func (w *markup) tag(open string, governs bool, text, end string) {
	w.raw(open)
	if governs {
		w.raw(" g")
	}
	w.raw(`">`)
	w.text(text)
	w.raw(end)
}

// link opens a link, if there is one. MathML Core has no links of its own, but a
// token may hold HTML, and that a formula again. The token is no mtext, which
// counts as space: an operator between two of them would lose its own.
func (w *markup) link(r Ref) {
	if !r.leads() {
		return
	}
	w.raw(`<mn class="l">`)
	w.anchor(r)
	w.raw("<math>")
}

// anchor writes the first tag of a link, if there is one.
func (w *markup) anchor(r Ref) {
	if !r.leads() {
		return
	}
	w.raw("<a")
	if r.Target != "" {
		w.raw(` href="#`)
		w.text(r.Target)
		w.raw(`"`)
	} else {
		w.raw(` tabindex="0"`)
	}
	if r.Tip != "" {
		w.raw(` data-tip="`)
		w.text(r.Tip)
		w.raw(`"`)
	}
	w.raw(">")
}

func (w *markup) unlink(r Ref) {
	if !r.leads() {
		return
	}
	w.raw("</math></a></mn>")
}

// symbol writes a quantity's name, with the superscript of a script about it.
func (w *markup) symbol(s Symbol, sup Node) {
	w.link(s.Ref)
	up := sup != nil
	switch {
	case len(s.Sub) > 0 && up:
		w.raw("<msubsup>")
	case len(s.Sub) > 0:
		w.raw("<msub>")
	case up:
		w.raw("<msup>")
	}
	w.head(s, up)
	if len(s.Sub) > 0 {
		w.raw("<mtext>")
		for i, p := range s.Sub {
			if i > 0 {
				w.raw(",")
			}
			w.text(p)
		}
		w.raw("</mtext>")
	}
	if up {
		w.single(sup)
	}
	switch {
	case len(s.Sub) > 0 && up:
		w.raw("</msubsup>")
	case len(s.Sub) > 0:
		w.raw("</msub>")
	case up:
		w.raw("</msup>")
	}
	w.unlink(s.Ref)
}

// leastLean is the least overhang that is worth room of its own, in hundredths
// of an em.
const leastLean = 3

// head writes the letters of a name, its figures and primes, and the room that
// a slanted letter needs to stay clear of what is before it and above it.
func (w *markup) head(s Symbol, up bool) {
	letters, figs := split(s.Head)
	back, lean := backhang(letters)/10, 0
	if up && figs == "" && s.Primes == 0 {
		lean = overhang(letters) / 10
	}
	group := figs != "" || back >= leastLean || lean >= leastLean
	if group {
		w.raw("<mrow>")
	}
	if back >= leastLean {
		w.blank(back)
	}
	w.raw("<mi")
	if s.Governs {
		w.raw(` class="g"`)
	}
	w.raw(">")
	w.text(letters)
	if figs != "" {
		w.raw("</mi><mn>")
		w.raw(figs)
		w.raw(primes(s.Primes))
		w.raw("</mn>")
	} else {
		w.raw(primes(s.Primes))
		w.raw("</mi>")
	}
	if lean >= leastLean {
		w.blank(lean)
	}
	if group {
		w.raw("</mrow>")
	}
}

func (w *markup) number(n Number) {
	negative, mantissa, power := figures(n.Value)
	parts := power != "" || len(n.Unit) > 0
	if parts {
		w.raw("<mrow>")
	}
	w.raw("<mn")
	if n.Governs {
		w.raw(` class="g"`)
	}
	w.raw(">")
	if negative {
		w.raw("−")
	}
	w.text(mantissa)
	w.raw("</mn>")
	if power != "" {
		w.raw("<mo>×</mo><msup><mn>10</mn><mn>")
		if power[0] == '-' {
			w.raw("−")
			power = power[1:]
		}
		w.text(power)
		w.raw("</mn></msup>")
	}
	if len(n.Unit) > 0 {
		if gap := n.Gap(); gap > 0 {
			w.space(gap)
		}
		w.unit(n.Unit)
	}
	if parts {
		w.raw("</mrow>")
	}
}

func (w *markup) unit(u Unit) {
	if u.flat() {
		var room [64]byte
		w.raw("<mtext>")
		w.text(string(appendFlat(room[:0], u)))
		w.raw("</mtext>")
		return
	}
	for _, t := range u {
		e := exponent(t)
		var room [32]byte
		if e != "" {
			w.raw("<msup>")
		}
		w.raw("<mtext>")
		w.text(string(appendTerm(room[:0], t)))
		w.raw("</mtext>")
		if e != "" {
			w.raw("<mn>")
			w.raw(e)
			w.raw("</mn></msup>")
		}
		if t.Close {
			w.raw("<mtext>)</mtext>")
		}
	}
}

func (w *markup) script(s Script) {
	if base, ok := s.Base.(Symbol); ok && s.Sub == nil {
		w.symbol(base, s.Sup)
		return
	}
	tag := "msubsup>"
	if s.Sub == nil {
		tag = "msup>"
	} else if s.Sup == nil {
		tag = "msub>"
	}
	w.raw("<")
	w.raw(tag)
	w.single(s.Base)
	if s.Sub != nil {
		w.single(s.Sub)
	}
	if s.Sup != nil {
		w.single(s.Sup)
	}
	w.raw("</")
	w.raw(tag)
}

func (w *markup) root(r Root) {
	if r.Index == nil {
		w.raw("<msqrt>")
		w.row(r.Body, Open)
		w.raw("</msqrt>")
		return
	}
	w.raw("<mroot>")
	w.single(r.Body)
	w.single(r.Index)
	w.raw("</mroot>")
}

// fence writes brackets as the first and the last of a group, where they are
// brackets without being told. Chromium gives one that may grow the width of
// its widest form, so those about a line of text may not.
func (w *markup) fence(f Fence) {
	bracket := "<mo stretchy=\"false\">"
	if tall(f.Body) {
		bracket = "<mo>"
	}
	w.raw("<mrow>")
	if f.Open != "" {
		w.raw(bracket)
		w.text(f.Open)
		w.raw("</mo>")
	}
	w.row(f.Body, Open)
	if f.Close != "" {
		w.raw(bracket)
		w.text(f.Close)
		w.raw("</mo>")
	}
	w.raw("</mrow>")
}

// strut writes what a bracket beside it grows with: no blank, which would leave
// the bracket to what stands about both.
func (w *markup) strut(n strut) {
	w.raw(`<mpadded height="`)
	w.hundredths(int(100 * n.up))
	w.raw(`" depth="`)
	w.hundredths(int(100 * n.down))
	w.raw(`"><mi></mi></mpadded>`)
}

// tall reports whether a node is taller than a line of text with its scripts.
func tall(n Node) bool {
	switch n := n.(type) {
	case Row:
		for _, c := range n {
			if tall(c) {
				return true
			}
		}
	case Fraction, Choice, strut:
		return true
	case Script:
		return tall(n.Base)
	case Root:
		return tall(n.Body)
	case Fence:
		return tall(n.Body)
	}
	return false
}

func (w *markup) choice(c Choice) {
	w.raw(`<mrow><mo>{</mo><mtable displaystyle="true">`)
	for _, b := range c.Branches {
		if b.Taken {
			w.raw(`<mtr class="taken">`)
		} else {
			w.raw("<mtr>")
		}
		w.raw("<mtd>")
		w.row(b.Value, Open)
		w.raw("</mtd><mtd>")
		if b.Cond != nil {
			w.raw("<mtext>if\u00a0</mtext>")
			w.row(b.Cond, Open)
		} else {
			w.raw("<mtext>otherwise</mtext>")
		}
		if b.Taken {
			w.raw("<mtext>\u2002←</mtext>")
		}
		w.raw("</mtd></mtr>")
	}
	w.raw("</mtable></mrow>")
}
