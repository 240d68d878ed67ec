package library

import (
	"io/fs"
	"slices"
	"strings"
	"testing"
)

// The library's own files have no faults, whoever calls them.
func TestLibraryIsSound(t *testing.T) {
	lib := Load()
	if len(lib.Names) < 70 || len(lib.Tables) < 7 {
		t.Errorf("%d helpers and %d tables, want 70 and 7 at least", len(lib.Names), len(lib.Tables))
	}
	seen := 0
	for _, topic := range lib.Topics() {
		if topic.Title == "" || topic.Intro == "" && topic.Entries[0].About == "" || len(topic.Entries) == 0 {
			t.Errorf("the topic %q lacks a title, a word of introduction or helpers", topic.Title)
		}
		for _, e := range topic.Entries {
			seen++
			h := e.Helper
			switch {
			case h.Note.Text == "" || h.Note.Source == "":
				t.Errorf("%s has no title or no source", h.Name.Text)
			case len(h.Gives) == 0:
				t.Errorf("%s gives nothing", h.Name.Text)
			case e.Title == "" || e.About == "":
				t.Errorf("%s stands under no heading or nothing is said of it", h.Name.Text)
			case lib.Read(h.Name.ID) != h:
				t.Errorf("%s is listed and cannot be called", h.Name.Text)
			}
		}
	}
	if seen != len(lib.Names) {
		t.Errorf("%d helpers are listed of %d: one of them stands twice", seen, len(lib.Names))
	}
	for name, p := range lib.places {
		for _, d := range p.diags {
			t.Error(d.Text())
		}
		if p.helper.Name == nil || p.helper.Name.ID != name {
			t.Errorf("the block of %s defines another helper", name)
		}
	}
}

// Every file is in the list of chapters, so that none is forgotten.
func TestChaptersAreComplete(t *testing.T) {
	found, err := fs.Glob(files, "*.md")
	if err != nil {
		t.Fatal(err)
	}
	for _, name := range found {
		if !slices.Contains(chapters, name) {
			t.Errorf("%s is in no list", name)
		}
	}
	if len(found) != len(chapters) {
		t.Errorf("%d files for %d chapters", len(found), len(chapters))
	}
}

// Each table says where its figures are from, and each helper's file can be
// named in a message.
func TestTablesNameTheirSource(t *testing.T) {
	for name, src := range Load().Tables {
		if !strings.HasPrefix(name, "library/") || src.Name != name {
			t.Errorf("the table %s is called %s", name, src.Name)
		}
		head, _, _ := strings.Cut(string(src.Text), "\nmark")
		if !strings.Contains(head, "# Source") {
			t.Errorf("%s names no source:\n%s", name, head)
		}
	}
}
