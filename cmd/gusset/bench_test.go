package main

import (
	"context"
	"io"
	"os"
	"path/filepath"
	"testing"
	"time"

	"gusset/notebook/store"
	"gusset/testdata/longcalc"
)

// BenchmarkWatch measures from the write of a file to its renamed page, less the
// quiet period, and in the same run what compiling and writing take alone.
// ratio is the one over the other.
func BenchmarkWatch(b *testing.B) {
	for _, only := range []string{"html", "pdf"} {
		b.Run(only, func(b *testing.B) {
			dir := b.TempDir()
			file, page := filepath.Join(dir, "calc.md"), filepath.Join(dir, "out", "C-500_A."+only)
			write(b, file, string(longcalc.Text(40, 1)))
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
				write(b, file, string(longcalc.Text(40, pull)))
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
