package export

import (
	"bufio"
	"errors"
	"fmt"
	"io"
	"io/fs"
	"os"
	"path/filepath"
)

// ToFile writes an outcome to a file by the writer for its name. The file appears whole or not at all: it
// is written beside its place and then renamed. When anything goes wrong an existing file stays as it was
// and nothing is left behind. A link is followed; the mode of an existing file is kept.
func ToFile(name string, o *Outcome) error {
	writer, err := ForFile(name)
	if err != nil {
		return err
	}
	if err := replace(name, func(w io.Writer) error { return writer.Write(w, o) }); err != nil {
		return fmt.Errorf("writing %s: %w", name, err)
	}
	return nil
}

// replace puts what write writes in place of the file.
func replace(name string, write func(io.Writer) error) error {
	target, mode, err := place(name)
	if err != nil {
		return err
	}
	part, err := beside(target)
	if err != nil {
		return err
	}
	done := false
	defer func() { // also when write panics
		if !done {
			part.Close()
			os.Remove(part.Name())
		}
	}()
	buffered := bufio.NewWriterSize(part, 1<<16)
	if err := write(buffered); err != nil {
		return err
	}
	if err := buffered.Flush(); err != nil {
		return err
	}
	if mode != 0 {
		if err := part.Chmod(mode); err != nil {
			return err
		}
	}
	if err := errors.Join(part.Sync(), part.Close()); err != nil {
		return err
	}
	if err := os.Rename(part.Name(), target); err != nil {
		return err
	}
	done = true
	return nil
}

// place follows links to the file itself and returns its mode, zero if there is none yet.
func place(name string) (target string, mode fs.FileMode, err error) {
	if target, err = filepath.EvalSymlinks(name); err != nil {
		if to, fault := os.Readlink(name); fault == nil && errors.Is(err, fs.ErrNotExist) { // to a file that is not there yet
			if !filepath.IsAbs(to) {
				to = filepath.Join(filepath.Dir(name), to)
			}
			return place(to)
		}
		if errors.Is(err, fs.ErrNotExist) {
			return name, 0, nil
		}
		return "", 0, err
	}
	info, err := os.Stat(target)
	if err != nil {
		return "", 0, err
	}
	if !info.Mode().IsRegular() {
		return "", 0, errors.New("there is something else than a plain file by that name")
	}
	return target, info.Mode().Perm(), nil
}

// beside creates a file of a new name in the folder of another.
func beside(target string) (*os.File, error) {
	for i := 0; ; i++ {
		name := filepath.Join(filepath.Dir(target), fmt.Sprintf(".workheat-%d-%d.part", os.Getpid(), i))
		f, err := os.OpenFile(name, os.O_WRONLY|os.O_CREATE|os.O_EXCL, 0o666)
		if i < 1000 && errors.Is(err, fs.ErrExist) {
			continue
		}
		return f, err
	}
}
