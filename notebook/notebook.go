// Package notebook compiles a calc file from bytes to results. It is the one
// door the rest of the program uses: Open for a file on disk, Compile for a
// file system in memory.
package notebook
