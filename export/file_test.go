package export

import (
	"errors"
	"io/fs"
	"os"
	"path/filepath"
	"sort"
	"strings"
	"testing"
)

// listing returns the files under a folder and what is in them.
func listing(t *testing.T, dir string) string {
	t.Helper()
	var lines []string
	err := filepath.WalkDir(dir, func(path string, d fs.DirEntry, err error) error {
		if err != nil || path == dir {
			return err
		}
		line, _ := filepath.Rel(dir, path)
		if d.Type().IsRegular() {
			data, err := os.ReadFile(path)
			if err != nil {
				return err
			}
			line += "=" + string(data)
		}
		lines = append(lines, filepath.ToSlash(line))
		return nil
	})
	if err != nil {
		t.Fatal(err)
	}
	sort.Strings(lines)
	return strings.Join(lines, " ")
}

func TestWriteFileAtomic(t *testing.T) {
	dir := t.TempDir()
	path := filepath.Join(dir, "a.dxf")
	if err := WriteFileAtomic(path, []byte("one"), false); err != nil {
		t.Fatal(err)
	}
	err := WriteFileAtomic(path, []byte("two"), false)
	var exist *ExistError
	if !errors.Is(err, fs.ErrExist) || !errors.As(err, &exist) || len(exist.Paths) != 1 || exist.Paths[0] != path || !strings.Contains(err.Error(), "a.dxf exists already") {
		t.Errorf("over a file: %v", err)
	}
	if got := listing(t, dir); got != "a.dxf=one" {
		t.Errorf("after a refusal: %s", got)
	}
	if err := WriteFileAtomic(path, []byte("two"), true); err != nil {
		t.Fatal(err)
	}
	if got := listing(t, dir); got != "a.dxf=two" {
		t.Errorf("after force: %s", got)
	}
	if err := os.Mkdir(filepath.Join(dir, "sub"), 0o755); err != nil {
		t.Fatal(err)
	}
	for name, p := range map[string]string{"a folder": filepath.Join(dir, "sub"), "no folder": filepath.Join(dir, "no", "b.dxf"), "no name": dir + string(filepath.Separator)} {
		if err := WriteFileAtomic(p, nil, true); err == nil {
			t.Errorf("%s: no error", name)
		}
	}
	if got := listing(t, dir); got != "a.dxf=two sub" {
		t.Errorf("at the end: %s", got)
	}
	info, err := os.Stat(path)
	if err != nil || info.Mode().Perm()&0o444 == 0 || info.Mode().Perm()&0o200 == 0 {
		t.Errorf("mode %v, %v", info.Mode(), err)
	}
}

func TestWriteFolder(t *testing.T) {
	two := []File{{"a", []byte("1")}, {"b", []byte("2")}}
	base := t.TempDir()
	dir := filepath.Join(base, "deep", "er")
	if err := WriteFolder(dir, two, false); err != nil {
		t.Fatal(err)
	}
	if got := listing(t, dir); got != "a=1 b=2" {
		t.Errorf("new folder: %s", got)
	}
	err := WriteFolder(dir, []File{{"c", nil}, {"b", []byte("x")}, {"a", []byte("x")}}, false)
	var exist *ExistError
	if !errors.As(err, &exist) || len(exist.Paths) != 2 || listing(t, dir) != "a=1 b=2" {
		t.Errorf("over two files: %v; %s", err, listing(t, dir))
	}
	if err := WriteFolder(dir, []File{{"b", []byte("3")}, {"c", []byte("4")}}, true); err != nil || listing(t, dir) != "a=1 b=3 c=4" {
		t.Errorf("with force: %v; %s", err, listing(t, dir))
	}
	for _, bad := range [][]File{{{"a", nil}, {"A", nil}}, {{"", nil}}, {{"..", nil}}, {{"x/y", nil}}, {{`x\y`, nil}}, {{"/x", nil}}} {
		if err := WriteFolder(filepath.Join(base, "new", "er"), bad, false); err == nil {
			t.Errorf("%v: no error", bad)
		}
	}
	if got := listing(t, base); got != "deep deep/er deep/er/a=1 deep/er/b=3 deep/er/c=4" {
		t.Errorf("after refusals: %s", got)
	}
}

// Whichever rename fails, the folder is as it was: the new file gone, the replaced ones back.
func TestWriteFolderRollsBack(t *testing.T) {
	broken := errors.New("broken")
	files := []File{{"a", []byte("new a")}, {"b", []byte("new b")}, {"c", []byte("new c")}, {"d", []byte("new d")}}
	for fail := range len(files) {
		dir := t.TempDir()
		if err := WriteFolder(dir, []File{{"a", []byte("old a")}, {"c", []byte("old c")}, {"z", []byte("z")}}, false); err != nil {
			t.Fatal(err)
		}
		before := listing(t, dir)
		calls := 0
		w := folderWriter{dir: dir, force: true, rename: func(from, to string) error {
			if calls++; calls == fail+1 {
				return broken
			}
			return os.Rename(from, to)
		}}
		if err := w.write(files); !errors.Is(err, broken) {
			t.Fatalf("rename %d: %v", fail, err)
		}
		if after := listing(t, dir); after != before {
			t.Errorf("rename %d fails: %s; before: %s", fail, after, before)
		}
	}
}

// A file that appears while others are staged is neither overwritten nor taken
// away, whether the disk knows hard links or not.
func TestWriteFolderLateFile(t *testing.T) {
	for _, links := range []bool{true, false} {
		dir := t.TempDir()
		late := func() error { return os.WriteFile(filepath.Join(dir, "b"), []byte("late"), 0o644) }
		w := folderWriter{dir: dir,
			rename: func(from, to string) error {
				if err := late(); err != nil {
					return err
				}
				return os.Rename(from, to)
			},
			link: func(from, to string) error {
				if !links {
					return errors.ErrUnsupported
				}
				if err := late(); err != nil {
					return err
				}
				return os.Link(from, to)
			}}
		if err := w.write([]File{{"a", nil}, {"b", nil}}); !errors.Is(err, fs.ErrExist) || listing(t, dir) != "b=late" {
			t.Errorf("links %v: %v; %s", links, err, listing(t, dir))
		}
	}
}

// Without force a new folder is written as well where there are no hard links.
func TestWriteFolderWithoutLinks(t *testing.T) {
	dir := t.TempDir()
	w := folderWriter{dir: dir, rename: os.Rename, link: func(string, string) error { return errors.ErrUnsupported }}
	if err := w.write([]File{{"a", []byte("1")}, {"b", []byte("2")}}); err != nil || listing(t, dir) != "a=1 b=2" {
		t.Errorf("%v; %s", err, listing(t, dir))
	}
}
