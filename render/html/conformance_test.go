package html_test

import (
	"os"
	"os/exec"
	"path/filepath"
	"testing"
)

// Pages conform to HTML, as html-validate judges where it is installed (npm
// install -g html-validate). Three of its opinions are not shared: bars are as
// long as their style says, ids have dots, and it does not see that a formula
// is the text of its link.
func TestConformance(t *testing.T) {
	tool, err := exec.LookPath("html-validate")
	if err != nil {
		if os.Getenv("CI") == "true" {
			t.Fatal("html-validate is missing")
		}
		t.Skip("no html-validate")
	}
	dir := t.TempDir()
	files := []string{"--config", "testdata/htmlvalidate.json"}
	for _, calc := range pages(t) {
		file := filepath.Join(dir, filepath.Base(calc)+".html")
		if err := os.WriteFile(file, write(t, calc), 0o666); err != nil {
			t.Fatal(err)
		}
		files = append(files, file)
	}
	if out, err := exec.Command(tool, files...).CombinedOutput(); err != nil {
		t.Errorf("%v\n%s", err, out[:min(len(out), 4000)])
	}
}
