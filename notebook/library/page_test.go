package library_test

import (
	"path/filepath"
	"regexp"
	"slices"
	"strings"
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

// A helper that follows a design standard cautions that the national annex or the adopted code decides, and names
// the edition; those of lifting parts say what governs these. A call hands the cautions on, apart from its lines.
func TestCautions(t *testing.T) {
	sheet, err := notebook.Open(filepath.Join("..", "..", "examples", "library.md"))
	if err != nil {
		t.Fatal(err)
	}
	standard := regexp.MustCompile(`^(EN 199\d|ANSI/A|ACI 318)`)
	lifting := []string{"link_shear", "pin_double_shear", "lug_tear_out", "lug_net_tension"}
	for _, st := range sheet.Steps {
		for _, c := range st.Calls {
			all := strings.Join(c.Cautions, "\n")
			if standard.MatchString(c.Helper.Note.Source) && !(strings.Contains(all, "national annex decides") || strings.Contains(all, "adopted code decides")) {
				t.Errorf("%s does not say who decides: %q", c.Helper.Name.Text, all)
			}
			if edition, _, _ := strings.Cut(c.Helper.Note.Source, ","); standard.MatchString(edition) && !strings.Contains(all, strings.TrimSuffix(edition, "/2018")) {
				t.Errorf("%s follows %s and cautions %q", c.Helper.Name.Text, edition, all)
			}
			if slices.Contains(lifting, c.Helper.Name.Text) && !strings.Contains(all, "own standard and their marking") {
				t.Errorf("%s does not say what governs lifting parts: %q", c.Helper.Name.Text, all)
			}
			for _, line := range c.Steps {
				if strings.HasPrefix(line.Note, "Caution") {
					t.Errorf("%s prints a caution among its lines: %s", c.Helper.Name.Text, line.Note)
				}
			}
		}
	}
}
