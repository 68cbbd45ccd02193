package main

import (
	"errors"
	"fmt"
	"strings"
)

// Exit statuses, as the README lists them.
const (
	exitDone     = 0
	exitCannot   = 1 // a file, the disk
	exitQuestion = 2 // the question is wrong
	exitNo       = 3 // done, and the answer is no
)

// A problem is an error that ends a run, with its exit status and its place.
type problem struct {
	status int
	where  string
	text   string
}

// Error returns where and what.
func (p *problem) Error() string {
	if p.where == "" {
		return p.text
	}
	return p.where + ": " + p.text
}

// fault says that the question is wrong at a place.
func fault(at place, format string, args ...any) error {
	return &problem{exitQuestion, at.String(), fmt.Sprintf(format, args...)}
}

// wrong says that the question is wrong, without a place in a file. A text that
// begins with a flag and a colon is placed at that flag.
func wrong(format string, args ...any) error {
	text := fmt.Sprintf(format, args...)
	if flag, rest, ok := strings.Cut(text, ": "); ok && strings.HasPrefix(flag, "-") {
		return &problem{exitQuestion, flag, rest}
	}
	return &problem{exitQuestion, "", text}
}

// cannot says that a file or the disk failed.
func cannot(format string, args ...any) error {
	return &problem{exitCannot, "", fmt.Sprintf(format, args...)}
}

// errNo ends a run whose answer is no; what there is to say has been printed.
var errNo = errors.New("the answer is no")
