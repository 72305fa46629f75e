package calendars

import (
	"bytes"
	"fmt"
	"strings"
	"testing"
	"time"
	"unicode/utf8"

	"gloam/plan"
	"gloam/track"
)

var stamp = time.Date(2026, 12, 1, 8, 30, 0, 0, time.UTC)

// component is a parsed calendar component.
type component struct {
	kind  string
	lines []property
	parts []*component
}

type property struct{ name, params, value string }

// all gives the values of every property of a name.
func (c *component) all(name string) (values []string) {
	for _, p := range c.lines {
		if p.name == name {
			values = append(values, p.value)
		}
	}
	return values
}

// one gives the value of a property that must stand once.
func (c *component) one(t testing.TB, name string) string {
	t.Helper()
	values := c.all(name)
	if len(values) != 1 {
		t.Fatalf("%s has %d of %s, want 1", c.kind, len(values), name)
	}
	return values[0]
}

// parse reads a calendar strictly: RFC 5545 section 3.1 for lines (CRLF, at
// most 75 octets, no split characters, no control characters) and section 3.6
// for components.
func parse(data []byte) (*component, error) {
	text := string(data)
	if !strings.HasSuffix(text, "\r\n") || strings.Count(text, "\n") != strings.Count(text, "\r\n") || strings.Count(text, "\r") != strings.Count(text, "\r\n") {
		return nil, fmt.Errorf("line ends other than CRLF")
	}
	for _, line := range strings.Split(text, "\r\n") {
		if len(line) > 75 || !utf8.ValidString(line) {
			return nil, fmt.Errorf("%d octets or split characters: %q", len(line), line)
		}
		if strings.IndexFunc(line, func(r rune) bool { return r < ' ' && r != '\t' || r == 0x7f }) >= 0 {
			return nil, fmt.Errorf("control character in %q", line)
		}
	}
	root := &component{}
	stack := []*component{root}
	for _, line := range strings.Split(strings.TrimSuffix(strings.ReplaceAll(text, "\r\n ", ""), "\r\n"), "\r\n") {
		head, value, ok := strings.Cut(line, ":")
		if !ok {
			return nil, fmt.Errorf("no property: %q", line)
		}
		name, params, _ := strings.Cut(head, ";")
		top := stack[len(stack)-1]
		switch name {
		case "BEGIN":
			below := &component{kind: value}
			top.parts = append(top.parts, below)
			stack = append(stack, below)
		case "END":
			if top.kind != value {
				return nil, fmt.Errorf("END:%s in %s", value, top.kind)
			}
			stack = stack[:len(stack)-1]
		default:
			top.lines = append(top.lines, property{name, params, value})
		}
	}
	if len(stack) != 1 || len(root.parts) != 1 || root.parts[0].kind != "VCALENDAR" {
		return nil, fmt.Errorf("not one whole calendar")
	}
	return root.parts[0], nil
}

// unescape turns TEXT back (RFC 5545, 3.3.11).
func unescape(s string) string {
	return strings.NewReplacer(`\\`, `\`, `\;`, ";", `\,`, ",", `\n`, "\n", `\N`, "\n").Replace(s)
}

// voyage is an invented passage with names as given.
func voyage(tb testing.TB, name, waypoint, departure string) *plan.Plan {
	tb.Helper()
	r := &track.Route{Name: name, Waypoints: []track.Waypoint{
		{Name: waypoint, Position: track.PositionFromDeg(38, -9.6)},
		{Name: waypoint, Position: track.PositionFromDeg(33, -16)},
	}}
	at, err := time.Parse(time.RFC3339, departure)
	if err != nil {
		tb.Fatal(err)
	}
	passage, err := r.Sail(track.Orders{Departure: at, SpeedKn: 6})
	if err != nil {
		tb.Fatal(err)
	}
	p, err := plan.New(passage, plan.DefaultSettings())
	if err != nil {
		tb.Fatal(err)
	}
	return p
}

func written(tb testing.TB, p *plan.Plan, opt Options) []byte {
	tb.Helper()
	var b bytes.Buffer
	if err := Write(&b, p, opt); err != nil {
		tb.Fatal(err)
	}
	return b.Bytes()
}

func parsed(tb testing.TB, p *plan.Plan, opt Options) *component {
	tb.Helper()
	cal, err := parse(written(tb, p, opt))
	if err != nil {
		tb.Fatal(err)
	}
	return cal
}

var usual = Options{Alarms: []time.Duration{20 * time.Minute}, Stamp: stamp}
