package calendars

import (
	"bytes"
	"encoding/json"
	"os"
	"os/exec"
	"path/filepath"
	"slices"
	"testing"
	"time"
)

// understood is what a parser made of an event.
type understood struct {
	UID, Start, End, Summary, Description string
	Alarm                                 []int // seconds from the start
}

// Independent parsers take the calendar without complaint and understand what
// was meant: python3-icalendar (Debian) and ical.js 2.2.1 (npm), which .ci/run
// installs.
func TestIndependentParsers(t *testing.T) {
	for _, tool := range []struct {
		name string
		find func() []string // the command, nil where it is missing
	}{
		{"python3-icalendar", pythonParser},
		{"ical.js", nodeParser},
	} {
		t.Run(tool.name, func(t *testing.T) {
			command := tool.find()
			if command == nil {
				t.Skipf("%s is not installed: .ci/run installs it", tool.name)
			}
			p := voyage(t, "Yawl Sorrel; Cascais, Funchal", "Cascais", "2027-02-10T12:00:00Z")
			data := written(t, p, usual)
			windows, got := p.Windows(), read(t, command, data)
			if len(got) != len(windows) {
				t.Fatalf("%d events, want %d", len(got), len(windows))
			}
			plain := parsed(t, p, usual)
			for i, g := range got {
				e, w := plain.parts[i], windows[i]
				want := understood{
					e.one(t, "UID"), whole(w.Begin).Format("20060102T150405Z"), whole(w.End).Format("20060102T150405Z"),
					w.Title(), unescape(e.one(t, "DESCRIPTION")), []int{-int((20 * time.Minute).Seconds())},
				}
				if g.UID != want.UID || g.Start != want.Start || g.End != want.End || g.Summary != want.Summary ||
					g.Description != want.Description || !slices.Equal(g.Alarm, want.Alarm) {
					t.Errorf("event %d: %+v\nwant %+v", i, g, want)
				}
			}
		})
	}
}

// The examples' calendars are taken too, and so are hostile names.
func TestIndependentParsersTakeAll(t *testing.T) {
	files, err := filepath.Glob("../examples/*.ics")
	if err != nil || len(files) < 3 {
		t.Fatalf("%d example calendars, want 3 or more (%v)", len(files), err)
	}
	var all [][]byte
	for _, f := range files {
		data, err := os.ReadFile(f)
		if err != nil {
			t.Fatal(err)
		}
		all = append(all, data)
	}
	for _, name := range hostile {
		all = append(all, written(t, voyage(t, name, name, "2027-02-10T12:00:00Z"), usual))
	}
	commands := slices.DeleteFunc([][]string{pythonParser(), nodeParser()}, func(c []string) bool { return c == nil })
	if len(commands) == 0 {
		t.Skip("neither python3-icalendar nor ical.js is installed: .ci/run installs them")
	}
	for _, command := range commands {
		for i, data := range all {
			if got := read(t, command, data); len(got) != bytes.Count(data, []byte("BEGIN:VEVENT")) {
				t.Errorf("%s: calendar %d: %d events", command[0], i, len(got))
			}
		}
	}
}

// read has a parser read a calendar.
func read(t *testing.T, command []string, data []byte) (events []understood) {
	t.Helper()
	cmd := exec.Command(command[0], command[1:]...)
	var out, errs bytes.Buffer
	cmd.Stdin, cmd.Stdout, cmd.Stderr = bytes.NewReader(data), &out, &errs
	if err := cmd.Run(); err != nil || errs.Len() > 0 {
		t.Fatalf("%s: %v: %s", command[0], err, &errs)
	}
	if err := json.Unmarshal(out.Bytes(), &events); err != nil {
		t.Fatal(err)
	}
	return events
}

func pythonParser() []string {
	for _, python := range []string{"/usr/bin/python3", "python3"} {
		if exec.Command(python, "-c", "import icalendar").Run() == nil {
			return []string{python, "testdata/parse.py"}
		}
	}
	return nil
}

func nodeParser() []string {
	found, err := filepath.Glob("../.ci/node_modules/ical.js/dist/ical.es5*.cjs")
	if err != nil || len(found) == 0 {
		return nil
	}
	library, err := filepath.Abs(found[0])
	if err != nil || exec.Command("node", "--version").Run() != nil {
		return nil
	}
	return []string{"node", "testdata/parse.cjs", library}
}
