package main

import (
	"bytes"
	"errors"
	"fmt"
	"io"
	"io/fs"
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
	mode := fs.FileMode(0o666)
	if info, err := os.Stat(path); err == nil {
		if info.IsDir() {
			return staged{}, errors.New("it is a folder")
		}
		mode = info.Mode().Perm()
	}
	temporary := fmt.Sprintf("%s.%d.part", path, os.Getpid())
	f, err := os.OpenFile(temporary, os.O_WRONLY|os.O_CREATE|os.O_EXCL, mode)
	if err != nil {
		return staged{}, err
	}
	_, err = f.Write(o.data.Bytes())
	if err = errors.Join(err, f.Sync(), f.Close()); err != nil {
		os.Remove(temporary)
		return staged{}, err
	}
	return staged{temporary, path}, nil
}

func writeDirect(o output, stdout io.Writer) error {
	if o.path == "-" {
		_, err := stdout.Write(o.data.Bytes())
		return err
	}
	return os.WriteFile(o.path, o.data.Bytes(), 0)
}
