package plan

import (
	"bytes"
	"errors"
	"regexp"
	"strings"
	"testing"
	"unicode/utf8"

	"gloam/track"
)

func textOf(t *testing.T, p *Plan, bold bool) string {
	t.Helper()
	var b bytes.Buffer
	if err := p.WriteText(&b, UsualKinds, bold); err != nil {
		t.Fatal(err)
	}
	return b.String()
}

// Text keeps to its width, prints no 60 minutes, and has every day, window and
// caution.
func TestTextOfSixVoyages(t *testing.T) {
	sixty := regexp.MustCompile(`60\.0'|:60`)
	for _, v := range readVoyages(t) {
		p := planOf(t, v.passage, DefaultSettings())
		text := textOf(t, p, false)
		for _, line := range strings.Split(text, "\n") {
			if n := utf8.RuneCountInString(line); n > textWidth || line != strings.TrimRight(line, " ") {
				t.Errorf("%s: %d wide or with blanks at its end: %q", v.name, n, line)
			}
			if sixty.MatchString(line) {
				t.Errorf("%s: sixty minutes in %q", v.name, line)
			}
		}
		if got := strings.Count(text, "ship's time UTC"); got != len(p.Days) {
			t.Errorf("%s: %d days printed, want %d", v.name, got, len(p.Days))
		}
		if got := strings.Count(text, "Best at "); got != len(p.Windows()) {
			t.Errorf("%s: %d windows printed, want %d", v.name, got, len(p.Windows()))
		}
		for _, c := range Cautions {
			if !strings.Contains(text, c) {
				t.Errorf("%s: no caution %q", v.name, c)
			}
		}
		if bold := textOf(t, p, true); strings.NewReplacer("\x1b[1m", "", "\x1b[0m", "").Replace(bold) != text {
			t.Errorf("%s: bold changes more than the looks", v.name)
		}
	}
}

func TestTextSaysWhyThereIsNoWindow(t *testing.T) {
	text := textOf(t, planOf(t, hovering(t, 78, 15, "2027-06-20T00:00:00Z", 1), DefaultSettings()), false)
	for _, want := range []string{"No star window: the Sun does not sink to -6° (lowest 11°", "Noon: Sun on the meridian    35°"} {
		if !strings.Contains(text, want) {
			t.Errorf("no %q in\n%s", want, text)
		}
	}
}

// With limits that let in one or two bodies the plan says so and shows them.
func TestTextOfFewBodies(t *testing.T) {
	p := planOf(t, hovering(t, 40, 0, "2026-11-20T12:00:00Z", 1), DefaultSettings())
	for count, want := range map[int]string{
		0: "Here: nothing to shoot: too low, too high, hidden, too faint or without horizon.",
		1: "Here: one body only: a line of position, no fix.",
		2: "Here: two bodies only: no check on the fix.",
	} {
		w := p.Days[0].Windows[0]
		w.Bodies, w.Round = w.Bodies[:count], nil
		w.Triads = p.Settings.triads(w.Bodies)
		some := &Plan{Passage: p.Passage, Clock: p.Clock, Settings: p.Settings, Days: []Day{{Day: p.Days[0].Day, Windows: []Window{w}}}}
		text := textOf(t, some, false)
		if !strings.Contains(text, want) || strings.Contains(text, "Triad") {
			t.Errorf("%d bodies: no %q, or a triad, in\n%s", count, want, text)
		}
		for _, c := range w.Bodies {
			if !strings.Contains(text, c.Label()) {
				t.Errorf("%d bodies: no %s", count, c.Label())
			}
		}
	}
}

type fullDisk struct{}

func (fullDisk) Write([]byte) (int, error) { return 0, errors.New("no space left") }

func TestWritersTellOfErrors(t *testing.T) {
	p := planOf(t, hovering(t, 40, 0, "2026-11-20T12:00:00Z", 1), DefaultSettings())
	if p.WriteText(fullDisk{}, UsualKinds, false) == nil || p.WriteJSON(fullDisk{}, UsualKinds) == nil {
		t.Error("a failing writer went unnoticed")
	}
}

func TestSettingsOutOfRange(t *testing.T) {
	p := hovering(t, 40, 0, "2026-11-20T12:00:00Z", 1)
	for want, spoil := range map[string]func(*Settings){
		"height of eye":     func(s *Settings) { s.EyeM = -1 },
		"temperature":       func(s *Settings) { s.TemperatureC = 100 },
		"pressure":          func(s *Settings) { s.PressureHPa = 0 },
		"sight error":       func(s *Settings) { s.SightError = 0 },
		"highest altitude":  func(s *Settings) { s.HighestAltitude = s.LowestAltitude / 2 },
		"Sun's upper limit": func(s *Settings) { s.UpperSun = s.LowerSun * 1.2 },
		"limits":            func(s *Settings) { s.UpperSun = s.LowerSun },
	} {
		set := DefaultSettings()
		spoil(&set)
		if _, err := New(p, set); err == nil || !strings.HasPrefix(err.Error(), want) {
			t.Errorf("%s: error %v", want, err)
		}
	}
}

// What the reader passed over is told.
func TestNotesArePrinted(t *testing.T) {
	r, err := track.ReadGeoJSON(strings.NewReader(`{"type":"LineString","coordinates":[[0,40],[0,40],[1,41]]}`))
	if err != nil {
		t.Fatal(err)
	}
	passage, err := r.Sail(track.Orders{Departure: instant(t, "2027-01-01T00:00:00Z"), SpeedKn: 5})
	if err != nil {
		t.Fatal(err)
	}
	p := planOf(t, passage, DefaultSettings())
	p.Notes = r.Notes
	if text := textOf(t, p, false); !strings.Contains(text, "Note: point 2 of the line repeats the one before it") {
		t.Errorf("no note in\n%s", text)
	}
}
