package main

import (
	"bufio"
	"io"
	"os"
	"os/exec"
	"path/filepath"
	"strings"
	"sync"
	"syscall"
	"testing"
	"time"
)

// patient is how long a test waits for what must come. No test depends on how
// soon it does.
const patient = 60 * time.Second

// process is a running `gusset watch`.
type process struct {
	cmd   *exec.Cmd
	lines chan string
	ended chan error
	mu    sync.Mutex
	all   []string
}

// startWatch starts the program in a folder and waits for its first build.
func startWatch(t *testing.T, dir string, args ...string) *process {
	t.Helper()
	p := &process{cmd: exec.Command("gusset", append([]string{"watch"}, args...)...), lines: make(chan string, 10000), ended: make(chan error, 1)}
	p.cmd.Dir = dir
	out, in := io.Pipe()
	p.cmd.Stdout, p.cmd.Stderr = in, in
	if err := p.cmd.Start(); err != nil {
		t.Fatal(err)
	}
	go func() {
		scanner := bufio.NewScanner(out)
		for scanner.Scan() {
			p.mu.Lock()
			p.all = append(p.all, scanner.Text())
			p.mu.Unlock()
			p.lines <- scanner.Text()
		}
	}()
	go func() {
		p.ended <- p.cmd.Wait()
		in.Close()
	}()
	t.Cleanup(func() { _ = p.cmd.Process.Kill() })
	p.wait(t, " ms  ")
	return p
}

// wait waits for a line that has all of the texts.
func (p *process) wait(t *testing.T, texts ...string) {
	t.Helper()
	deadline := time.After(patient)
	for {
		select {
		case line := <-p.lines:
			if hasAll(line, texts) {
				return
			}
		case <-deadline:
			t.Fatalf("no line with %q came; there were\n%s", texts, p.said())
		}
	}
}

func hasAll(line string, texts []string) bool {
	for _, text := range texts {
		if !strings.Contains(line, text) {
			return false
		}
	}
	return true
}

// said is everything that was printed so far.
func (p *process) said() string {
	p.mu.Lock()
	defer p.mu.Unlock()
	return strings.Join(p.all, "\n")
}

// end sends a signal and wants the process to end as it should.
func (p *process) end(t *testing.T, signal os.Signal) {
	t.Helper()
	if err := p.cmd.Process.Signal(signal); err != nil {
		t.Fatal(err)
	}
	select {
	case err := <-p.ended:
		if err != nil {
			t.Fatalf("it ended with %v:\n%s", err, p.said())
		}
	case <-time.After(patient):
		t.Fatal("it does not end")
	}
}

func (p *process) interrupt(t *testing.T) {
	t.Helper()
	p.end(t, syscall.SIGINT)
}

// gussetIn runs the program in a folder and returns what it printed and its status.
func gussetIn(t *testing.T, dir string, args ...string) (out string, status int) {
	t.Helper()
	cmd := exec.Command("gusset", args...)
	cmd.Dir = dir
	text, err := cmd.CombinedOutput()
	if err != nil && cmd.ProcessState == nil {
		t.Fatal(err)
	}
	return string(text), cmd.ProcessState.ExitCode()
}

func write(t testing.TB, file, text string) {
	t.Helper()
	if err := os.MkdirAll(filepath.Dir(file), 0o777); err != nil {
		t.Fatal(err)
	}
	if err := os.WriteFile(file, []byte(text), 0o666); err != nil {
		t.Fatal(err)
	}
}

func read(t testing.TB, file string) string {
	t.Helper()
	text, err := os.ReadFile(file)
	if err != nil {
		t.Fatal(err)
	}
	return string(text)
}

// needs finds a program of the test's; without it the test is skipped, but fails
// where CI=true.
func needs(t *testing.T, program string) string {
	t.Helper()
	path, err := exec.LookPath(program)
	if err != nil {
		missing(t, program+" is not installed")
	}
	return path
}

func missing(t *testing.T, what string) {
	t.Helper()
	if os.Getenv("CI") == "true" {
		t.Fatal(what)
	}
	t.Skip(what)
}
