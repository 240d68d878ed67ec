package main

import (
	"context"
	"fmt"
	"io"
	"os"
	"path/filepath"
	"strings"
	"testing"
	"time"

	"gusset/notebook/store"
)

// longCalc is the calc of testdata/long-calc with forty sections: 600 computed
// statements in about 90 kB. The pull of its joints is as given, in kN.
func longCalc(b *testing.B, pull int) string {
	front := read(b, "../../testdata/long-calc/front.md")
	section := read(b, "../../testdata/long-calc/section.md")
	var out strings.Builder
	out.WriteString(front)
	for i := range 40 {
		out.WriteString(strings.ReplaceAll(strings.Replace(section, "84 kN", fmt.Sprint(pull, " kN"), 1), "@", fmt.Sprint(i)))
	}
	return out.String()
}

// BenchmarkWatch measures from the write of a file to its renamed page, less the
// quiet period, and in the same run what compiling and writing take alone.
// ratio is the one over the other.
func BenchmarkWatch(b *testing.B) {
	for _, only := range []string{"html", "pdf"} {
		b.Run(only, func(b *testing.B) {
			dir := b.TempDir()
			file, page := filepath.Join(dir, "calc.md"), filepath.Join(dir, "out", "C-500_A."+only)
			write(b, file, longCalc(b, 1))
			p := &printer{to: filepath.Join(dir, "out"), only: only}
			ctx, cancel := context.WithCancel(context.Background())
			ended := make(chan error)
			go func() { ended <- watch(ctx, &terminal{out: io.Discard, err: io.Discard}, p, []string{file}) }()
			last := renamed(page, nil)
			time.Sleep(2 * longestWait)
			var latency, floor time.Duration
			pull := 1
			for b.Loop() {
				pull++
				write(b, file, longCalc(b, pull))
				start := time.Now()
				last = renamed(page, last)
				latency += time.Since(start) - quiet
				time.Sleep(2 * quiet) // the build's end

				s := store.New()
				start = time.Now()
				r := s.Compile([]string{file})[0]
				if w := p.write(r.Sheet, filepath.Join(dir, "alone")); w.err != nil {
					b.Fatal(w.err)
				}
				floor += time.Since(start)
			}
			cancel()
			if err := <-ended; err != nil {
				b.Fatal(err)
			}
			b.ReportMetric(float64(latency.Microseconds())/1e3/float64(b.N), "ms/save")
			b.ReportMetric(float64(floor.Microseconds())/1e3/float64(b.N), "ms/compile+write")
			b.ReportMetric(float64(latency)/float64(floor), "ratio")
		})
	}
}

// renamed waits until a file is not the one it was.
func renamed(file string, last os.FileInfo) os.FileInfo {
	for {
		if info, err := os.Stat(file); err == nil && !os.SameFile(info, last) {
			return info
		}
		time.Sleep(100 * time.Microsecond)
	}
}
