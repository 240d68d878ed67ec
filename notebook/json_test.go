package notebook

import (
	"bytes"
	"encoding/json"
	"os"
	"path/filepath"
	"strings"
	"testing"
	"testing/fstest"

	"github.com/google/go-cmp/cmp"
	"github.com/rogpeppe/go-internal/txtar"
)

// Each file of testdata/json is a root; the part `want` is what is printed of its
// calc.md for a machine, with a line for each entry, and then the listing.
func TestJSON(t *testing.T) {
	cases, err := filepath.Glob("testdata/json/*.txtar")
	if err != nil || len(cases) == 0 {
		t.Fatal("no cases", err)
	}
	for _, name := range cases {
		t.Run(strings.TrimSuffix(filepath.Base(name), ".txtar"), func(t *testing.T) {
			archive, err := txtar.ParseFile(name)
			if err != nil {
				t.Fatal(err)
			}
			root := fstest.MapFS{}
			want := map[string]string{}
			kept := archive.Files[:0:0]
			for _, f := range archive.Files {
				if f.Name == "json" || f.Name == "listing" {
					want[f.Name] = string(f.Data)
					continue
				}
				kept = append(kept, f)
				root[f.Name] = &fstest.MapFile{Data: f.Data}
			}
			s := compile(root, "calc.md")
			raw := s.JSON()
			if !json.Valid(raw) || bytes.ContainsAny(raw, "\n\u2212\u2009\u00a0\u202f") {
				t.Errorf("no JSON on one line with plain signs: %s", raw)
			}
			parts := strings.NewReplacer(`},{`, "},\n{", `":[{`, "\":[\n{", `}],"`, "}],\n\"")
			got := map[string]string{"json": parts.Replace(string(raw)) + "\n", "listing": listing(s)}
			if *update {
				archive.Files = append(kept, txtar.File{Name: "json", Data: []byte(got["json"])}, txtar.File{Name: "listing", Data: []byte(got["listing"])})
				if err := os.WriteFile(name, txtar.Format(archive), 0o644); err != nil {
					t.Fatal(err)
				}
				return
			}
			if d := cmp.Diff(want, got); d != "" {
				t.Error(d)
			}
		})
	}
}

func listing(s *Sheet) string {
	var b strings.Builder
	for _, l := range s.Listing() {
		kind := [...]string{"heading", "value", "check"}[l.Kind]
		b.WriteString(strings.TrimRight(strings.Join([]string{kind, l.Number, l.Name, l.Value, l.Utilisation, l.Verdict, l.Governs, l.Note, l.Source}, " | "), " |") + "\n")
	}
	return b.String()
}

func TestStatus(t *testing.T) {
	ok := compile(files("a.md", calc("```calc\nx = 1\ncheck x <= 1\n```\n")), "a.md")
	ng := compile(files("a.md", calc("```calc\nx = 1\ncheck x < 1\n```\n")), "a.md")
	bad := compile(files("a.md", calc("```calc\nx = 1\ncheck x < 1\ny = z\n```\n")), "a.md")
	tests := []struct {
		sheets []*Sheet
		want   int
	}{
		{nil, 0}, {[]*Sheet{ok}, 0}, {[]*Sheet{ng}, 3}, {[]*Sheet{bad}, 1}, {[]*Sheet{ok, ng}, 3}, {[]*Sheet{ng, bad, ok}, 1},
	}
	for _, tt := range tests {
		if got := Status(tt.sheets...); got != tt.want {
			t.Errorf("%d sheets: got %d, want %d", len(tt.sheets), got, tt.want)
		}
	}
}
