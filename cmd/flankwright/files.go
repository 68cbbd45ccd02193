package main

import (
	"errors"
	"fmt"
	"io/fs"
	"os"
	"path/filepath"
	"strings"

	"github.com/urfave/cli/v2"

	"flankwright/export"
)

// isFolder reports whether an output names a folder: it ends in a slash, or is one.
func isFolder(path string) bool {
	if strings.HasSuffix(path, "/") || strings.HasSuffix(path, string(filepath.Separator)) {
		return true
	}
	info, err := os.Stat(path)
	return err == nil && info.IsDir()
}

// deliver writes a result to -o, or to standard output.
func deliver(c *cli.Context, data []byte) error {
	path := c.String("output")
	if path == "" || path == "-" {
		return toStdout(c, data)
	}
	if err := writeFile(c, path, data); err != nil {
		return err
	}
	fmt.Fprintf(c.App.ErrWriter, "%s written\n", path)
	return nil
}

// writeFile writes one file whole or not at all; an existing one is kept unless --force.
func writeFile(c *cli.Context, path string, data []byte) error {
	if job := c.Args().First(); job != "" && job != "-" && sameFile(job, path) {
		return wrong("-o %s: is the job itself; write to another file", path)
	}
	return fileError(path, export.WriteFileAtomic(path, data, c.Bool("force")))
}

func sameFile(a, b string) bool {
	x, err1 := os.Stat(a)
	y, err2 := os.Stat(b)
	return err1 == nil && err2 == nil && os.SameFile(x, y)
}

// fileError words an error of writing a file or into a folder.
func fileError(path string, err error) error {
	if err == nil {
		return nil
	}
	var exists *export.ExistError
	var p *os.PathError
	switch {
	case errors.As(err, &exists):
		return cannot("%v; --force overwrites", exists)
	case errors.Is(err, fs.ErrNotExist):
		return cannot("%s: there is no such folder; make it first", path)
	case errors.As(err, &p):
		return cannot("%s: %v", path, p.Err)
	}
	return cannot("%s: %v", path, err)
}
