package figure

import (
	"strconv"
	"unicode/utf8"

	"gusset/render/fonts"
)

// SVG appends the drawing as an SVG element for a web page. Its ids start with
// a prefix that is the drawing's own on the page. Text is text, in the faces
// that the page embeds, and placed letter for letter as on paper.
func (d *Drawing) SVG(dst []byte, prefix string) []byte {
	w := &svg{dst}
	w.raw(`<svg class="art" role="img" aria-labelledby="`)
	w.text(prefix)
	w.raw(`-title `)
	w.text(prefix)
	w.raw(`-desc" width="`)
	w.number(d.Width)
	w.raw(`pt" height="`)
	w.number(d.Height)
	w.raw(`pt" viewBox="0 0 `)
	w.number(d.Width)
	w.raw(" ")
	w.number(d.Height)
	w.raw(`" xmlns="http://www.w3.org/2000/svg" style="font-kerning:none;font-variant-ligatures:none"><title id="`)
	w.text(prefix)
	w.raw(`-title">`)
	w.text(d.Title)
	w.raw(`</title><desc id="`)
	w.text(prefix)
	w.raw(`-desc">`)
	w.text(d.Desc)
	w.raw("</desc>\n")
	for i := range d.Items {
		if it := &d.Items[i]; it.Path != nil {
			w.path(it)
		} else {
			w.label(it)
		}
	}
	w.raw("</svg>")
	return w.b
}

type svg struct{ b []byte }

func (w *svg) raw(s string) { w.b = append(w.b, s...) }

// number writes a length to a thousandth of a point, no zeros behind.
func (w *svg) number(x float64) {
	from := len(w.b)
	w.b = strconv.AppendFloat(w.b, x, 'f', 3, 64)
	for w.b[len(w.b)-1] == '0' {
		w.b = w.b[:len(w.b)-1]
	}
	if w.b[len(w.b)-1] == '.' {
		w.b = w.b[:len(w.b)-1]
	}
	if string(w.b[from:]) == "-0" {
		w.b = append(w.b[:from], '0')
	}
}

func (w *svg) colour(c Colour) {
	const digits = "0123456789abcdef"
	w.b = append(w.b, '#')
	for shift := 20; shift >= 0; shift -= 4 {
		w.b = append(w.b, digits[c>>shift&15])
	}
}

func (w *svg) path(it *Item) {
	if it.Stroke == 0 {
		w.raw(`<path fill="`)
		w.colour(it.Colour)
	} else {
		w.raw(`<path fill="none" stroke="`)
		w.colour(it.Colour)
		w.raw(`" stroke-width="`)
		w.number(it.Stroke)
		for i, l := range it.Dash {
			if i == 0 {
				w.raw(`" stroke-dasharray="`)
			} else {
				w.raw(" ")
			}
			w.number(l)
		}
	}
	w.raw(`" d="`)
	for _, s := range it.Path {
		switch s.Kind {
		case Move:
			w.raw("M")
			w.point(s.P)
		case Line:
			w.raw("L")
			w.point(s.P)
		case Curve:
			w.raw("C")
			w.point(s.C1)
			w.raw(" ")
			w.point(s.C2)
			w.raw(" ")
			w.point(s.P)
		case Close:
			w.raw("Z")
		}
	}
	w.raw("\"/>\n")
}

func (w *svg) point(p Point) {
	w.number(p.X)
	w.raw(" ")
	w.number(p.Y)
}

// label writes the runs of a label as one text.
func (w *svg) label(it *Item) {
	w.raw(`<text fill="`)
	w.colour(it.Colour)
	w.raw(`">`)
	for _, r := range it.Text {
		w.raw(`<tspan x="`)
		w.number(r.X)
		w.raw(`" y="`)
		w.number(r.Y)
		w.raw(`" font-family="`)
		w.raw(family(r.Face))
		w.raw(`" font-size="`)
		w.number(r.Size)
		if r.Face.Weight != 400 {
			w.raw(`" font-weight="`)
			w.raw(strconv.Itoa(r.Face.Weight))
		}
		if r.Face.Italic {
			w.raw(`" font-style="italic`)
		}
		w.raw(`">`)
		w.text(r.Text)
		w.raw("</tspan>")
	}
	w.raw("</text>\n")
}

// family is a face's family with what stands in where it did not load.
func family(f *fonts.Face) string {
	switch f {
	case fonts.Sans, fonts.SansSemiBold:
		return f.Short + ",sans-serif"
	case fonts.Math:
		return f.Short + ",math"
	case fonts.Mono:
		return f.Short + ",monospace"
	}
	return f.Short + ",serif"
}

// text writes character data or an attribute's value. What XML cannot hold
// becomes a replacement character; marks that turn the direction of writing
// are left out.
func (w *svg) text(s string) {
	for _, r := range s {
		switch {
		case r == '&':
			w.raw("&amp;")
		case r == '<':
			w.raw("&lt;")
		case r == '>':
			w.raw("&gt;")
		case r == '"':
			w.raw("&quot;")
		case r == '\n' || r == '\t':
			w.raw(" ")
		case r < ' ' || r >= 0x7F && r < 0xA0 || r == 0xFFFE || r == 0xFFFF:
			w.raw("\uFFFD")
		case r == 0x061C || r == 0x200E || r == 0x200F || r >= 0x202A && r <= 0x202E || r >= 0x2066 && r <= 0x2069:
		default:
			w.b = utf8.AppendRune(w.b, r)
		}
	}
}
