package files_test

import (
	"errors"
	"os"
	"path/filepath"
	"testing"

	"example.com/twopoint/examples/internal/files"
)

// A file is there as a whole or not at all, and nothing else is.
func TestWhole(t *testing.T) {
	dir := t.TempDir()
	path := filepath.Join(dir, "report")
	names := func() (n int) {
		list, err := os.ReadDir(dir)
		if err != nil {
			t.Fatal(err)
		}
		return len(list)
	}
	f, err := files.CreateWhole(path)
	if err != nil {
		t.Fatal(err)
	}
	f.WriteString("half")
	full := errors.New("disk full")
	if err := f.Finish(full); !errors.Is(err, full) || names() != 0 {
		t.Errorf("%v, %d files", err, names())
	}
	if f, err = files.CreateWhole(path); err != nil {
		t.Fatal(err)
	}
	f.WriteString("half")
	if f.Discard(); names() != 0 {
		t.Errorf("%d files", names())
	}
	if f, err = files.CreateWhole(path); err != nil {
		t.Fatal(err)
	}
	f.WriteString("whole")
	err = f.Finish(nil)
	if data, e := os.ReadFile(path); err != nil || e != nil || string(data) != "whole" || names() != 1 {
		t.Errorf("%v, %v, %q, %d files", err, e, data, names())
	}
	if f, err = files.CreateWhole(path); err != nil {
		t.Fatal(err)
	}
	f.WriteString("half")
	err = f.Finish(full)
	if data, e := os.ReadFile(path); !errors.Is(err, full) || e != nil || string(data) != "whole" || names() != 1 {
		t.Errorf("after the failure of a second: %v, %v, %q, %d files", err, e, data, names())
	}
	if _, err := files.CreateWhole(dir); err == nil {
		t.Error("a folder is taken for a file")
	}
}
