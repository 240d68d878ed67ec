package pdf

import (
	"fmt"
	"os"
	"os/exec"
	"path/filepath"
	"runtime"
	"strings"
	"testing"
	"time"

	"gusset/notebook/store"
	"gusset/render"
	"gusset/testdata/longcalc"
)

// BenchmarkColdPrint prints a long calc by a process of its own, in turns with
// compiling and writing the same in this one, and with bare fpdf drawing the
// same texts and rules. peak-MB is the most memory that the process held.
func BenchmarkColdPrint(b *testing.B) {
	dir := b.TempDir()
	program, file := filepath.Join(dir, "gusset"), filepath.Join(dir, "calc.md")
	if out, err := exec.Command("go", "build", "-o", program, "gusset/cmd/gusset").CombinedOutput(); err != nil {
		b.Fatalf("%v: %s", err, out)
	}
	for _, sections := range []int{20, 40} {
		b.Run(fmt.Sprint(sections, "-sections"), func(b *testing.B) {
			if err := os.WriteFile(file, longcalc.Text(sections, 84), 0o666); err != nil {
				b.Fatal(err)
			}
			l := newDocument(render.NewPage(store.New().Compile([]string{file})[0].Sheet)).layout()
			r := recorded(l)
			var cold, warm, bare time.Duration
			peak := 0
			for b.Loop() {
				cmd := exec.Command(program, "print", "calc.md", "--only", "pdf", "--to", "out")
				cmd.Dir = dir
				start := time.Now()
				if err := cmd.Start(); err != nil {
					b.Fatal(err)
				}
				held := mostHeld(cmd.Process.Pid)
				if err := cmd.Wait(); err != nil {
					b.Fatal(err)
				}
				cold += time.Since(start)
				peak = max(peak, <-held)
				runtime.GC()
				start = time.Now()
				if _, err := Write(render.NewPage(store.New().Compile([]string{file})[0].Sheet), time.Time{}); err != nil {
					b.Fatal(err)
				}
				warm += time.Since(start)
				runtime.GC()
				start = time.Now()
				r.run(b)
				bare += time.Since(start)
			}
			ms := func(d time.Duration) float64 { return d.Seconds() * 1e3 / float64(b.N) }
			b.ReportMetric(float64(len(l.pages)), "pages")
			b.ReportMetric(ms(cold), "process-ms")
			b.ReportMetric(ms(warm), "compile+write-ms")
			b.ReportMetric(ms(bare), "replay-ms")
			b.ReportMetric(float64(cold)/float64(bare), "process/replay")
			b.ReportMetric(float64(peak)/1024, "peak-MB")
		})
	}
}

// mostHeld looks at a process until it ends, and tells the most memory that it
// held, in kB. What the kernel says at its end would count the process it was
// started from.
func mostHeld(pid int) <-chan int {
	held := make(chan int, 1)
	go func() {
		peak := 0
		for {
			status, err := os.ReadFile(fmt.Sprint("/proc/", pid, "/status"))
			_, rest, ok := strings.Cut(string(status), "VmHWM:")
			if err != nil || !ok {
				held <- peak
				return
			}
			fmt.Sscan(rest, &peak)
			time.Sleep(5 * time.Millisecond)
		}
	}()
	return held
}
