package main

import (
	"context"
	"errors"
	"fmt"
	"io"
	"os"
	"path/filepath"
	"strings"
	"unicode"

	"workheat/network/diag"
)

// mostBytes is read of a file: more than the reader takes, so that it can say how much is too much.
const mostBytes = 80 << 20

// A source is a netlist file as it was read, with the files that it names.
type source struct {
	name string
	text []byte
	read []string // paths of all files read, the netlist first
}

// readSource reads a netlist. A file that never ends is cut, and an interruption ends the wait for a pipe that nobody
// writes to.
func readSource(ctx context.Context, name string) (*source, error) {
	type answer struct {
		text []byte
		err  error
	}
	done := make(chan answer, 1)
	read := func() {
		text, err := readMost(name)
		done <- answer{text, err}
	}
	stopped := ctx.Done()
	if info, err := os.Stat(name); err != nil || info.Mode().IsRegular() || info.IsDir() {
		read()
		stopped = nil // it does not wait, so that an interrupted run still tells how things stand
	} else {
		go read()
	}
	select {
	case a := <-done:
		if a.err != nil {
			return nil, coded{exitProblem, fmt.Sprintf("%s cannot be read: %s", name, diag.Reason(a.err))}
		}
		return &source{name: name, text: a.text, read: []string{name}}, nil
	case <-stopped:
		return nil, coded{exitInterrupted, "interrupted while reading " + name}
	}
}

// open reads a file that the netlist names, from its folder.
func (s *source) open(file string) ([]byte, error) {
	if filepath.IsAbs(file) || !filepath.IsLocal(file) {
		return nil, errors.New("only files in the folder of the netlist, or below it, are read")
	}
	path := filepath.Join(filepath.Dir(s.name), file)
	s.read = append(s.read, path)
	return readMost(path)
}

// readMost reads a file up to a limit.
func readMost(name string) ([]byte, error) {
	f, err := os.Open(name)
	if err != nil {
		return nil, err
	}
	defer f.Close()
	return io.ReadAll(io.LimitReader(f, mostBytes))
}

// checkOutputs refuses a file that would be written over what was read, or twice.
func (s *source) checkOutputs(files []string) error {
	for i, f := range files {
		for _, earlier := range files[:i] {
			if filepath.Clean(f) == filepath.Clean(earlier) {
				return coded{exitProblem, fmt.Sprintf("%s is to be written twice: give each -o a name of its own", f)}
			}
		}
		out, err := os.Stat(f)
		if err != nil {
			continue // not there yet; what else is wrong shows when it is written
		}
		for _, name := range s.read {
			if in, err := os.Stat(name); err == nil && os.SameFile(in, out) {
				return coded{exitProblem, fmt.Sprintf("%s is read by this run and would be written over: give -o another name", f)}
			}
		}
	}
	return nil
}

// A checkedWriter keeps the first error of what it writes to, so that a full disk is not taken for success.
type checkedWriter struct {
	to  io.Writer
	err error
}

func (w *checkedWriter) Write(p []byte) (int, error) {
	if w.err != nil {
		return 0, w.err
	}
	n, err := w.to.Write(p)
	w.err = err
	return n, err
}

// printable returns text with a replacement sign for whatever could steer a terminal, such as in the name of a file.
func printable(text string) string {
	return strings.Map(func(r rune) rune {
		if r == '\n' || r == '\t' || unicode.IsPrint(r) {
			return r
		}
		return unicode.ReplacementChar
	}, text)
}
