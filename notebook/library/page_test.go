package library_test

import (
	"path/filepath"
	"testing"

	"gusset/notebook"
)

// The library's page calls every helper once, and nothing is wrong with it.
func TestLibraryPage(t *testing.T) {
	sheet, err := notebook.Open(filepath.Join("..", "..", "examples", "library.md"))
	if err != nil {
		t.Fatal(err)
	}
	for _, d := range sheet.Diagnostics {
		t.Error(d.Text())
	}
	called := map[string]int{}
	for _, st := range sheet.Steps {
		for _, c := range st.Calls {
			called[c.Helper.Name.ID]++
		}
	}
	for name := range helpers(t) {
		if called[name] != 1 {
			t.Errorf("%s is called %d times", name, called[name])
		}
	}
}
