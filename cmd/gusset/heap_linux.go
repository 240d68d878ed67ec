package main

import (
	"runtime"
	"syscall"
)

// room is the heap of a calc of some two hundred sheets.
const room = 64 << 20

// infinity is the limit where there is none.
const infinity = ^uint64(0)

// hugePages has the kernel hand out the heap in huge pages, for the verbs that
// write PDF. Fifty sheets touch some 9,000 small ones for the first time, which
// can take as long as all of the work on them. The runtime has no setting for
// this, but uses memory that it takes back as it was advised. None of it is
// touched here, and where the kernel refuses the heap is as it was. A process
// whose address space is limited may have no room for it, and goes without.
func hugePages() {
	var limit syscall.Rlimit
	if syscall.Getrlimit(syscall.RLIMIT_AS, &limit) != nil || limit.Cur != infinity {
		return
	}
	heap := make([]byte, room)
	_ = syscall.Madvise(heap, syscall.MADV_HUGEPAGE)
	runtime.KeepAlive(heap)
	runtime.GC()
}
