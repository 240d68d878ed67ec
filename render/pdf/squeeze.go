package pdf

import (
	"bytes"
	"compress/zlib"
	"errors"
	"fmt"
	"runtime"
	"slices"
	"strconv"
	"sync/atomic"

	"golang.org/x/sync/errgroup"
)

// squeezer takes a file from the library, which writes it in one go, and
// holds it squeezed.
type squeezer struct{ file []byte }

func (s *squeezer) Write(file []byte) (n int, err error) {
	s.file, err = squeeze(file)
	return len(file), err
}

// squeeze compresses the streams of a file that the library left plain: the
// contents of the pages. The library itself takes a fresh compressor for each
// page, which costs more than all else it does; here one serves many. The
// objects keep their order and their numbers, and their places are written anew.
func squeeze(file []byte) ([]byte, error) {
	table, err := findTable(file)
	if err != nil {
		return nil, err
	}
	order := make([]int, len(table.at))
	for i := range order {
		order[i] = i
	}
	slices.SortFunc(order, func(a, b int) int { return table.at[a] - table.at[b] })
	objects := make([]object, len(order))
	for i, n := range order {
		end := table.start
		if i+1 < len(order) {
			end = table.at[order[i+1]]
		}
		objects[i].whole = file[table.at[n]:end]
		objects[i].content, objects[i].plain = plainStream(objects[i].whole)
	}
	if err := pack(objects); err != nil {
		return nil, err
	}

	var out bytes.Buffer
	out.Grow(len(file)/2 + 4096)
	out.Write(file[:table.at[order[0]]])
	at := make([]int, len(table.at))
	for i, n := range order {
		at[n] = out.Len()
		o := &objects[i]
		if !o.plain {
			out.Write(o.whole)
			continue
		}
		head := o.whole[:bytes.IndexByte(o.whole, '\n')]
		fmt.Fprintf(&out, "%s\n<</Filter /FlateDecode /Length %d>>\nstream\n", head, len(o.packed))
		out.Write(o.packed)
		out.WriteString("\nendstream\nendobj\n")
	}
	start := out.Len()
	fmt.Fprintf(&out, "xref\n0 %d\n0000000000 65535 f \n", len(at)+1)
	for _, offset := range at {
		fmt.Fprintf(&out, "%010d 00000 n \n", offset)
	}
	out.Write(file[table.end:table.trailer])
	fmt.Fprintf(&out, "startxref\n%d\n%%%%EOF\n", start)
	return out.Bytes(), nil
}

// object is an object of a file; the content of a plain stream is packed.
type object struct {
	whole, content, packed []byte
	plain                  bool
}

// streamsEach is how many streams are worth a compressor, which takes more than
// a megabyte.
const streamsEach = 16

// pack compresses the plain streams, many on all processors.
func pack(objects []object) error {
	streams := 0
	for i := range objects {
		if objects[i].plain {
			streams++
		}
	}
	var next atomic.Int64
	var work errgroup.Group
	for range min(runtime.GOMAXPROCS(0), 1+streams/streamsEach) {
		work.Go(func() error {
			var packed bytes.Buffer
			z, err := zlib.NewWriterLevel(&packed, zlib.BestSpeed)
			if err != nil {
				return err
			}
			for i := next.Add(1) - 1; i < int64(len(objects)); i = next.Add(1) - 1 {
				o := &objects[i]
				if !o.plain {
					continue
				}
				packed.Reset()
				z.Reset(&packed)
				if _, err := z.Write(o.content); err != nil {
					return err
				}
				if err := z.Close(); err != nil {
					return err
				}
				o.packed = bytes.Clone(packed.Bytes())
			}
			return nil
		})
	}
	return work.Wait()
}

// table is the cross-reference table of a file: where each object starts, the
// object 1 first, where the table starts and ends, and where the trailer ends.
type table struct {
	at                  []int
	start, end, trailer int
}

var errTable = errors.New("the PDF has no cross-reference table as it should")

func findTable(file []byte) (table, error) {
	var t table
	t.trailer = bytes.LastIndex(file, []byte("startxref\n"))
	if t.trailer < 0 {
		return t, errTable
	}
	var count int
	if _, err := fmt.Sscanf(string(file[t.trailer:]), "startxref\n%d", &t.start); err != nil || t.start >= t.trailer {
		return t, errTable
	}
	if _, err := fmt.Sscanf(string(file[t.start:min(t.start+40, t.trailer)]), "xref\n0 %d", &count); err != nil {
		return t, errTable
	}
	const entry = len("0000000000 65535 f \n")
	rows := t.start + len("xref\n0 ") + len(strconv.Itoa(count)) + 1
	t.end = rows + count*entry
	if count < 2 || t.end > t.trailer {
		return t, errTable
	}
	for i := 1; i < count; i++ {
		offset, err := strconv.Atoi(string(file[rows+i*entry : rows+i*entry+10]))
		if err != nil || offset >= t.start {
			return t, errTable
		}
		t.at = append(t.at, offset)
	}
	return t, nil
}

// plainStream returns the content of an object that is a stream without a
// filter and nothing else.
func plainStream(object []byte) ([]byte, bool) {
	_, rest, ok := bytes.Cut(object, []byte(" 0 obj\n<</Length "))
	if !ok || len(object)-len(rest) > 40 {
		return nil, false
	}
	digits, rest, ok := bytes.Cut(rest, []byte(">>\nstream\n"))
	length, err := strconv.Atoi(string(digits))
	if !ok || err != nil || length < 0 || length > len(rest) {
		return nil, false
	}
	return rest[:length], string(rest[length:]) == "\nendstream\nendobj\n"
}
