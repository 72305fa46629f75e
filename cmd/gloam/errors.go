package main

import (
	"errors"
	"fmt"
	"io"

	"gloam/track"
)

// usageError is a mistake in the command line itself.
type usageError struct{ error }

func usage(err error) error {
	if err == nil {
		return nil
	}
	return usageError{err}
}

// fileError puts a file's name before what is wrong with it.
type fileError struct {
	file string
	err  error
}

func (e *fileError) Error() string { return e.file + ": " + e.err.Error() }
func (e *fileError) Unwrap() error { return e.err }

// hinted is an error that knows the next action.
type hinted struct {
	error
	hint string
}

func exitCode(err error) int {
	var u usageError
	switch {
	case err == nil:
		return exitDone
	case errors.As(err, &u):
		return exitUsage
	}
	return exitFailed
}

// report prints an error as "gloam: FILE: PLACE: what was met (what is
// allowed)" and, where there is one, a hint on a line of its own.
func report(w io.Writer, err error) {
	fmt.Fprintf(w, "gloam: %v\n", err)
	if hint := hintOf(err); hint != "" {
		fmt.Fprintf(w, "hint: %s\n", hint)
	}
}

func hintOf(err error) string {
	var h hinted
	var t *track.Error
	var u usageError
	switch {
	case errors.As(err, &h):
		return h.hint
	case errors.As(err, &t):
		return t.Hint
	case errors.As(err, &u):
		return "--help shows what may be given"
	}
	return ""
}
