package export

import (
	"bytes"
	"errors"
	"fmt"
	"io/fs"
	"os"
	"path/filepath"
	"strings"
)

// An ExistError names files that are there already and were not to be
// overwritten. It wraps fs.ErrExist.
type ExistError struct{ Paths []string }

// Error lists the files.
func (e *ExistError) Error() string {
	if len(e.Paths) == 1 {
		return e.Paths[0] + " exists already"
	}
	return strings.Join(e.Paths, ", ") + " exist already"
}

// Unwrap returns fs.ErrExist.
func (e *ExistError) Unwrap() error { return fs.ErrExist }

// A File is a file to be written: its name within a folder, and what is in it.
type File struct {
	Name string
	Data []byte
}

// WriteFileAtomic writes a file so that a reader sees it whole or not at all: into
// a temporary file in the same folder, synced, read back, then given its name. A file that exists is
// an *ExistError unless force is set; whatever is no regular file is never
// replaced. Nothing is left behind on failure.
func WriteFileAtomic(path string, data []byte, force bool) error {
	dir, name := filepath.Split(path)
	if dir == "" {
		dir = "."
	}
	w := folderWriter{dir: dir, force: force, rename: os.Rename, link: os.Link}
	return w.write([]File{{name, data}})
}

// WriteFolder writes files into a folder, all or none, and makes the folder where
// it is missing. With force, files that exist are replaced; without, they are one
// *ExistError and nothing is written. On failure the folder is as it was before.
func WriteFolder(dir string, files []File, force bool) error {
	first := firstMissing(dir)
	if err := os.MkdirAll(dir, 0o755); err != nil {
		return err
	}
	w := folderWriter{dir: dir, force: force, rename: os.Rename, link: os.Link}
	err := w.write(files)
	if err != nil {
		// Take away the folders made here, from the inside out; Remove spares
		// one that somebody else has put something into.
		for d := filepath.Clean(dir); first != "" && len(d) >= len(first); d = filepath.Dir(d) {
			if os.Remove(d) != nil {
				break
			}
		}
	}
	return err
}

// firstMissing returns the outermost folder of dir that does not exist, or "".
func firstMissing(dir string) string {
	missing := ""
	for d := filepath.Clean(dir); ; d = filepath.Dir(d) {
		if _, err := os.Lstat(d); !errors.Is(err, fs.ErrNotExist) || d == filepath.Dir(d) {
			return missing
		}
		missing = d
	}
}

// A folderWriter writes files into one folder, all or none.
type folderWriter struct {
	dir    string
	force  bool
	rename func(from, to string) error // os.Rename; another one in tests
	link   func(from, to string) error // os.Link; another one in tests
	undo   []func()                    // what to do on failure, last first
	done   []func()                    // what to do after success
}

// write stages all files, then puts them in place.
func (w *folderWriter) write(files []File) (err error) {
	if err := w.check(files); err != nil {
		return err
	}
	defer func() {
		if err != nil {
			for i := len(w.undo) - 1; i >= 0; i-- {
				w.undo[i]()
			}
			return
		}
		for _, f := range w.done {
			f()
		}
	}()
	staged := make([]string, len(files))
	for i, f := range files {
		if staged[i], err = w.stage(f); err != nil {
			return err
		}
	}
	for i, f := range files {
		if err := w.place(staged[i], filepath.Join(w.dir, f.Name), i == len(files)-1); err != nil {
			return err
		}
	}
	return nil
}

// check looks at all names, and at what stands there already.
func (w *folderWriter) check(files []File) error {
	seen := map[string]bool{}
	exist := &ExistError{}
	for _, f := range files {
		if f.Name == "" || f.Name == "." || !filepath.IsLocal(f.Name) || strings.ContainsAny(f.Name, `/\`) {
			return fmt.Errorf("%q is no file name", f.Name)
		}
		// Folders on Windows and macOS don't tell upper from lower case.
		if key := strings.ToLower(f.Name); seen[key] {
			return fmt.Errorf("two files want the name %q", f.Name)
		} else {
			seen[key] = true
		}
		path := filepath.Join(w.dir, f.Name)
		info, err := os.Lstat(path)
		switch {
		case errors.Is(err, fs.ErrNotExist):
		case err != nil:
			return err
		case !w.force:
			exist.Paths = append(exist.Paths, path)
		case !info.Mode().IsRegular():
			return fmt.Errorf("%s is no regular file, and is not replaced", path)
		}
	}
	if len(exist.Paths) > 0 {
		return exist
	}
	return nil
}

// stage writes a file under a temporary name beside its place, reads it back
// from the disk, and compares.
func (w *folderWriter) stage(f File) (name string, err error) {
	t, err := w.temporary()
	if err != nil {
		return "", err
	}
	w.undo = append(w.undo, func() { os.Remove(t.Name()) })
	_, err = t.Write(f.Data)
	if err == nil {
		err = t.Sync()
	}
	if e := t.Close(); err == nil {
		err = e
	}
	if err != nil {
		return "", err
	}
	back, err := os.ReadFile(t.Name())
	if err == nil && !bytes.Equal(back, f.Data) {
		err = fmt.Errorf("%s: the disk gives back other bytes than were written", f.Name)
	}
	return t.Name(), err
}

// temporary opens a new file of a name of our own, with the permissions that
// any new file gets here.
func (w *folderWriter) temporary() (*os.File, error) {
	for n := 0; ; n++ {
		name := filepath.Join(w.dir, fmt.Sprintf(".flankwright-%d-%d.tmp", os.Getpid(), n))
		t, err := os.OpenFile(name, os.O_RDWR|os.O_CREATE|os.O_EXCL, 0o666)
		if !errors.Is(err, fs.ErrExist) || n > 10000 {
			return t, err
		}
	}
}

// place gives a staged file its name. Without force it never replaces a file,
// even one that somebody wrote since check looked: a hard link fails where the
// name is taken. With force, what stood there comes back on failure.
func (w *folderWriter) place(staged, path string, last bool) error {
	if !w.force {
		return w.placeNew(staged, path)
	}
	undo := func() { os.Remove(path) }
	if _, err := os.Lstat(path); err == nil && !last { // after the last rename nothing can fail any more
		old, err := os.ReadFile(path)
		if err != nil {
			return err
		}
		aside, err := w.stage(File{Name: filepath.Base(path), Data: old})
		if err != nil {
			return err
		}
		undo = func() { w.rename(aside, path) }
		w.done = append(w.done, func() { os.Remove(aside) })
	}
	if err := w.rename(staged, path); err != nil {
		return err
	}
	w.undo = append(w.undo, undo)
	return nil
}

// placeNew puts a staged file where there is none. Where the disk knows no hard
// links it is renamed, after one more look.
func (w *folderWriter) placeNew(staged, path string) error {
	err := w.link(staged, path)
	switch {
	case errors.Is(err, fs.ErrExist):
		return &ExistError{Paths: []string{path}}
	case err == nil:
		w.done = append(w.done, func() { os.Remove(staged) })
	default:
		if _, err := os.Lstat(path); err == nil {
			return &ExistError{Paths: []string{path}}
		}
		if err := w.rename(staged, path); err != nil {
			return err
		}
	}
	w.undo = append(w.undo, func() { os.Remove(path) })
	return nil
}
