package main

import (
	"bytes"
	"errors"
	"fmt"
	"io"
	"io/fs"
	"math/rand/v2"
	"os"
	"path/filepath"
)

// output is a file to be written; the path "-" is standard output.
type output struct {
	path string
	data *bytes.Buffer
}

// staged is an output that stands complete under a temporary name.
type staged struct{ temporary, path string }

// writeAll writes all outputs or, where one cannot be written, none: each goes
// to a temporary name beside its own, then standard output, devices and pipes
// are written straight, and the files are renamed at the end.
func writeAll(outputs []output, stdout io.Writer) (err error) {
	var ready []staged
	defer func() {
		for _, s := range ready {
			os.Remove(s.temporary) // gone already where it was renamed
		}
	}()
	var direct []output
	for _, o := range outputs {
		if o.path == "-" || special(o.path) {
			direct = append(direct, o)
			continue
		}
		s, err := stage(o)
		if err != nil {
			return cannotWrite(o.path, err)
		}
		ready = append(ready, s)
	}
	for _, o := range direct {
		if err := writeDirect(o, stdout); err != nil {
			return cannotWrite(o.path, err)
		}
	}
	for _, s := range ready {
		if err := os.Rename(s.temporary, s.path); err != nil {
			return cannotWrite(s.path, err)
		}
	}
	return nil
}

func cannotRead(path string, err error, hint string) error {
	return hinted{&fileError{path, bare(err)}, hint}
}

// bare is an error of a file without the operation and the path.
func bare(err error) error {
	var p *fs.PathError
	if errors.As(err, &p) {
		return p.Err
	}
	return err
}

func cannotWrite(path string, err error) error {
	err = bare(err)
	return hinted{&fileError{path, fmt.Errorf("cannot be written: %w", err)}, "check the folder and its permissions, or name another file"}
}

// special tells whether a path exists and is neither file nor folder.
func special(path string) bool {
	info, err := os.Stat(path)
	return err == nil && !info.Mode().IsRegular() && !info.IsDir()
}

// stage writes the data to a new file beside the one meant, which it takes
// after in its permissions. A symbolic link is followed.
func stage(o output) (staged, error) {
	path := o.path
	if real, err := filepath.EvalSymlinks(path); err == nil {
		path = real
	}
	earlier, err := os.Stat(path)
	if err == nil && earlier.IsDir() {
		return staged{}, errors.New("it is a folder")
	}
	f, err := temporary(path)
	if err != nil {
		return staged{}, err
	}
	if earlier != nil {
		err = f.Chmod(earlier.Mode().Perm())
	}
	_, failed := f.Write(o.data.Bytes())
	if err = errors.Join(err, failed, f.Sync(), f.Close()); err != nil {
		os.Remove(f.Name())
		return staged{}, err
	}
	return staged{f.Name(), path}, nil
}

// temporary makes a new file beside a path, with the permissions that a new
// file gets here (os.CreateTemp would keep it from everybody else).
func temporary(path string) (f *os.File, err error) {
	for range 100 {
		name := fmt.Sprintf("%s.%08x.part", path, rand.Uint32())
		f, err = os.OpenFile(name, os.O_WRONLY|os.O_CREATE|os.O_EXCL, 0o666)
		if !errors.Is(err, fs.ErrExist) {
			break
		}
	}
	return f, err
}

// sameOutput tells whether two paths, neither empty, name one file, there or
// not.
func sameOutput(a, b string) bool {
	return a != "" && b != "" && (whole(a) == whole(b) || sameFile(a, b))
}

// whole is a path with its folder's links followed.
func whole(path string) string {
	if path == "-" {
		return path
	}
	folder, err := filepath.EvalSymlinks(filepath.Dir(path))
	if err == nil {
		folder, err = filepath.Abs(folder)
	}
	if err != nil {
		return filepath.Clean(path)
	}
	return filepath.Join(folder, filepath.Base(path))
}

func sameFile(a, b string) bool {
	ia, errA := os.Stat(a)
	ib, errB := os.Stat(b)
	return errA == nil && errB == nil && ia.Mode().IsRegular() && os.SameFile(ia, ib)
}

func writeDirect(o output, stdout io.Writer) error {
	if o.path == "-" {
		_, err := stdout.Write(o.data.Bytes())
		return err
	}
	return os.WriteFile(o.path, o.data.Bytes(), 0)
}
