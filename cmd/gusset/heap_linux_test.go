package main

import (
	"runtime"
	"syscall"
	"testing"
)

// TestHugePagesLimited wants no room taken where the address space is limited.
func TestHugePagesLimited(t *testing.T) {
	taken := func() uint64 {
		var before, after runtime.MemStats
		runtime.ReadMemStats(&before)
		hugePages()
		runtime.ReadMemStats(&after)
		return after.TotalAlloc - before.TotalAlloc
	}
	var old syscall.Rlimit
	if err := syscall.Getrlimit(syscall.RLIMIT_AS, &old); err != nil {
		t.Fatal(err)
	}
	if n := taken(); old.Cur == infinity && n < room {
		t.Errorf("took %d bytes where nothing limits it", n)
	}
	if err := syscall.Setrlimit(syscall.RLIMIT_AS, &syscall.Rlimit{Cur: min(1<<40, old.Max), Max: old.Max}); err != nil {
		t.Fatal(err)
	}
	defer func() { _ = syscall.Setrlimit(syscall.RLIMIT_AS, &old) }()
	if n := taken(); n >= room {
		t.Errorf("took %d bytes where the address space is limited", n)
	}
}
