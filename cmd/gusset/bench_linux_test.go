package main

import (
	"os/exec"
	"path/filepath"
	"syscall"
	"testing"
	"time"

	"gusset/notebook/store"
)

// BenchmarkColdPrint prints the PDF of fifty pages by a process of its own, and in
// turns compiles and writes the same in this one. peak-MB is the most memory
// that the process held.
func BenchmarkColdPrint(b *testing.B) {
	dir := b.TempDir()
	file := filepath.Join(dir, "calc.md")
	write(b, file, fiftyPages(1))
	p := &printer{only: "pdf"}
	var cold, warm time.Duration
	peak := int64(0)
	for b.Loop() {
		cmd := exec.Command("gusset", "print", "calc.md", "--only", "pdf", "--to", "out")
		cmd.Dir = dir
		start := time.Now()
		if out, err := cmd.CombinedOutput(); err != nil {
			b.Fatalf("%v: %s", err, out)
		}
		cold += time.Since(start)
		if usage, ok := cmd.ProcessState.SysUsage().(*syscall.Rusage); ok {
			peak = max(peak, usage.Maxrss)
		}
		start = time.Now()
		r := store.New().Compile([]string{file})[0]
		if w := p.write(r.Sheet, filepath.Join(dir, "alone")); w.err != nil {
			b.Fatal(w.err)
		}
		warm += time.Since(start)
	}
	b.ReportMetric(float64(cold.Microseconds())/1e3/float64(b.N), "ms/process")
	b.ReportMetric(float64(warm.Microseconds())/1e3/float64(b.N), "ms/compile+write")
	b.ReportMetric(float64(cold)/float64(warm), "ratio")
	b.ReportMetric(float64(peak)/1024, "peak-MB")
}
