package html

import (
	"runtime"
	"slices"
	"sync"

	"github.com/yuin/goldmark/ast"

	"gusset/notebook"
)

// part is a run of the document's blocks, from one up to another, nil for the
// end, with the writer that writes it.
type part struct {
	writer
	from, to ast.Node
	failed   any // what a panic said
}

// least is the weight that makes a part worth a goroutine.
const least = 100

// contents writes the document and the lists, in parts on all processors. A
// part is written into its share of the room behind what is written already.
func (w *writer) contents() {
	parts := w.parts(runtime.GOMAXPROCS(0))
	if len(parts) == 1 {
		w.part(&parts[0])
		return
	}
	free := w.b[len(w.b):cap(w.b)]
	size := len(free) / len(parts)
	var work sync.WaitGroup
	for i := range parts {
		p := &parts[i]
		p.writer = *w
		p.b = free[i*size : i*size : (i+1)*size]
		work.Go(func() {
			defer func() { p.failed = recover() }()
			p.part(p)
		})
	}
	work.Wait()
	if slices.ContainsFunc(parts, func(p part) bool { return len(p.b) > size }) {
		w.b = slices.Clip(w.b) // put together in place, one that outgrew its share would overwrite the next
	}
	for i := range parts {
		p := &parts[i]
		if p.failed != nil {
			panic(p.failed)
		}
		w.b = append(w.b, p.b...)
		w.mono, w.strong = w.mono || p.mono, w.strong || p.strong
	}
}

// part writes a part; the lists belong to the last.
func (w *writer) part(p *part) {
	w.document(p.from, p.to)
	if p.to == nil {
		w.raw("</main>\n")
		w.lists()
	}
}

// parts cuts the document into at most so many parts that take about as long to
// write. What a block weighs was measured.
func (w *writer) parts(most int) []part {
	weight := func(n ast.Node) int {
		if f, ok := n.(*notebook.FenceNode); ok {
			return 3 * len(w.page.Blocks[f.Index])
		}
		return 2
	}
	total := 0
	for n := w.sheet.Doc.FirstChild(); n != nil; n = n.NextSibling() {
		total += weight(n)
	}
	total += total / 10 // the lists
	parts := []part{{from: w.sheet.Doc.FirstChild()}}
	share, sum := max(total/most, least), 0
	for n := w.sheet.Doc.FirstChild(); n != nil; n = n.NextSibling() {
		if sum >= share*len(parts) && len(parts) < most {
			parts[len(parts)-1].to = n
			parts = append(parts, part{from: n})
		}
		sum += weight(n)
	}
	return parts
}
