package pdf

import (
	"bytes"
	"fmt"
	"runtime"
	"testing"
	"time"

	"github.com/go-pdf/fpdf"

	"gusset/render/maths"
	"gusset/testdata/longcalc"
)

// replay is what bare fpdf takes to draw what a layout draws: the same texts,
// fills and faces in the same order.
type replay struct {
	paper paper
	pages [][]any // text and fill, in page coordinates
}

func recorded(l *layout) *replay {
	r := &replay{paper: l.paper}
	for i, page := range l.pages {
		var ops []any
		put := func(k *ink, x, y float64) {
			for _, f := range k.fills {
				f.x, f.y = f.x+x, f.y+y
				ops = append(ops, f)
			}
			for _, t := range k.texts {
				t.x, t.y = t.x+x, t.y+y
				if t.items == nil {
					ops = append(ops, t)
				}
				for _, i := range t.items {
					switch i.Kind {
					case maths.Rule:
						ops = append(ops, fill{t.x + i.X, t.y + i.Y, i.Width, i.Height, t.colour})
					case maths.Run:
						ops = append(ops, text{x: t.x + i.X, y: t.y + i.Y, text: i.Text, style: style{face: i.Face, size: i.Size, colour: t.colour}})
					}
				}
			}
		}
		for _, s := range page {
			for _, b := range s.bands {
				ops = append(ops, fill{sideMargin + b.x, s.y, b.width, s.height, b.colour})
			}
		}
		top := topMargin + stripHeight
		if i == 0 {
			top = l.title.height
			put(&l.title.ink, sideMargin, topMargin)
		} else {
			k := l.strip("1 of 1")
			put(&k, sideMargin, topMargin)
		}
		k := l.columns(l.paper.foot() - top)
		put(&k, sideMargin, top)
		for j := range page {
			put(&page[j].ink, sideMargin, page[j].y+page[j].pad)
		}
		r.pages = append(r.pages, ops)
	}
	return r
}

func (r *replay) run(b testing.TB) int {
	f := fpdf.New("P", "pt", r.paper.name, "")
	f.SetAutoPageBreak(false, 0)
	f.SetCatalogSort(true)
	f.SetCreationDate(fixedDate)
	f.SetModificationDate(fixedDate)
	known := map[string]bool{}
	var st style
	for _, ops := range r.pages {
		f.AddPage()
		for _, op := range ops {
			switch op := op.(type) {
			case fill:
				if op.colour != st.colour {
					f.SetFillColor(int(op.colour>>16), int(op.colour>>8&255), int(op.colour&255))
					f.SetTextColor(int(op.colour>>16), int(op.colour>>8&255), int(op.colour&255))
					st.colour = op.colour
				}
				f.Rect(op.x, op.y, op.w, op.h, "F")
			case text:
				if op.colour != st.colour {
					f.SetFillColor(int(op.colour>>16), int(op.colour>>8&255), int(op.colour&255))
					f.SetTextColor(int(op.colour>>16), int(op.colour>>8&255), int(op.colour&255))
					st.colour = op.colour
				}
				if op.face != st.face || op.size != st.size {
					if !known[op.face.Name+fmt.Sprint(op.face.Weight, op.face.Italic)] {
						known[op.face.Name+fmt.Sprint(op.face.Weight, op.face.Italic)] = true
						f.AddUTF8FontFromBytes(faceFamily(op.face), "", op.face.TTF)
					}
					f.SetFont(faceFamily(op.face), "", op.size)
					st.face, st.size = op.face, op.size
				}
				f.Text(op.x, op.y, op.text)
			}
		}
	}
	var out bytes.Buffer
	if err := f.Output(&out); err != nil {
		b.Fatal(err)
	}
	return out.Len()
}

// BenchmarkWrite writes the PDF of a long calc, and beside it bare fpdf draws
// the same runs and rules; x-replay is the ratio.
func BenchmarkWrite(b *testing.B) {
	for _, sections := range []int{20, 40, 200} {
		b.Run(fmt.Sprint(sections, "-sections"), func(b *testing.B) {
			p := pageOf(b, string(longcalc.Text(sections, 84)), nil)
			l := newDocument(p).layout()
			r := recorded(l)
			b.ReportAllocs()
			var own, bare time.Duration
			b.ResetTimer()
			for range b.N {
				runtime.GC()
				start := time.Now()
				if _, err := Write(p, time.Time{}); err != nil {
					b.Fatal(err)
				}
				own += time.Since(start)
				b.StopTimer()
				runtime.GC()
				start = time.Now()
				r.run(b)
				bare += time.Since(start)
				b.StartTimer()
			}
			b.ReportMetric(float64(len(l.pages)), "pages") // a timer that is reset forgets it
			b.ReportMetric(own.Seconds()/bare.Seconds(), "x-replay")
			b.ReportMetric(bare.Seconds()*1000/float64(b.N), "replay-ms")
		})
	}
}
