package html_test

import (
	"bytes"
	"flag"
	"os"
	"path/filepath"
	"regexp"
	"strings"
	"sync"
	"testing"

	"gusset/render"
	"gusset/render/html"
)

var update = flag.Bool("update", false, "write the golden files anew")

var data = regexp.MustCompile(`base64,[A-Za-z0-9+/=]+`)

// body is a page without its styles, and the data of images left out.
func body(page []byte) string {
	_, rest, _ := bytes.Cut(page, []byte("<body>\n"))
	return string(data.ReplaceAll(rest, []byte("base64,…")))
}

func TestGolden(t *testing.T) {
	files, err := filepath.Glob("testdata/*.md")
	if err != nil {
		t.Fatal(err)
	}
	for _, file := range files {
		got := body(write(t, file))
		golden := strings.TrimSuffix(file, ".md") + ".html"
		if *update {
			if err := os.WriteFile(golden, []byte(got), 0o666); err != nil {
				t.Fatal(err)
			}
		}
		want, err := os.ReadFile(golden)
		if err != nil {
			t.Fatal(err)
		}
		if got == string(want) {
			continue
		}
		g, w := strings.Split(got, "\n"), strings.Split(string(want), "\n")
		for i := range g {
			if i >= len(w) || g[i] != w[i] {
				t.Errorf("%s line %d:\n got %s\nwant %s", golden, i+1, g[i], append(w, "")[min(i, len(w))])
				break
			}
		}
	}
}

// The same sheet gives the same bytes, also when several goroutines write it,
// since nothing in it is changed; and so does a sheet compiled anew.
func TestSameBytes(t *testing.T) {
	for _, file := range pages(t) {
		s := compile(t, file)
		want := html.Append(nil, render.NewPage(s))
		got := make([][]byte, 4)
		var group sync.WaitGroup
		for i := range got {
			group.Go(func() { got[i] = html.Append(nil, render.NewPage(s)) })
		}
		group.Wait()
		for _, g := range append(got, write(t, file)) {
			if !bytes.Equal(g, want) {
				t.Errorf("%s: other bytes", file)
			}
		}
	}
}

// A page appends to what is there.
func TestAppend(t *testing.T) {
	p := render.NewPage(compile(t, "testdata/lug.md"))
	if got := html.Append([]byte("before"), p); !bytes.HasPrefix(got, []byte("before<!DOCTYPE html>")) {
		t.Errorf("got %q", got[:40])
	}
}
