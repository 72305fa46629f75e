package calendars

import (
	"bytes"
	"errors"
	"fmt"
	"io"
	"strings"
	"unicode/utf8"
)

// Limits of a calendar that is read.
const (
	maxCalendarBytes = 16 << 20
	maxLines         = 300000
	maxDepth         = 8
)

// line is a content line (RFC 5545, 3.1): as it stands in the file, folds
// included, and taken apart.
type line struct {
	raw   []byte // ends with CRLF
	name  string // in capitals
	value string // as written, escapes included
}

// part is a component: its lines and the components in it, in order.
type part struct {
	kind       string
	begin, end line
	items      []item
}

// item is either a line or a component.
type item struct {
	line line
	part *part
}

// readLines reads a calendar that has one VCALENDAR. Lines that are not taken
// apart elsewhere keep their bytes, but for line ends, which become CRLF.
func readLines(r io.Reader) (*part, error) {
	data, err := io.ReadAll(io.LimitReader(r, maxCalendarBytes+1))
	if err != nil {
		return nil, err
	}
	data = bytes.TrimPrefix(data, []byte("\xef\xbb\xbf"))
	switch {
	case len(data) > maxCalendarBytes:
		return nil, fmt.Errorf("over %d MB (a calendar is at most that)", maxCalendarBytes>>20)
	case !utf8.Valid(data):
		return nil, errors.New("not UTF-8 (an iCalendar file is)")
	}
	lines, err := unfold(data)
	if err != nil {
		return nil, err
	}
	return components(lines)
}

var folds = strings.NewReplacer("\r\n ", "", "\r\n\t", "")

// unfold splits data into content lines; their raw bytes are parts of one copy.
func unfold(data []byte) (lines []line, err error) {
	data = bytes.ReplaceAll(data, []byte("\r\n"), []byte("\n"))
	if at := bytes.IndexAny(data, "\r\x00"); at >= 0 {
		return nil, fmt.Errorf("line %d: a control character (text)", bytes.Count(data[:at], []byte("\n"))+1)
	}
	data = bytes.ReplaceAll(data, []byte("\n"), []byte("\r\n"))
	if !bytes.HasSuffix(data, []byte("\r\n")) {
		data = append(data, "\r\n"...)
	}
	for start := 0; start < len(data); {
		end := start + bytes.IndexByte(data[start:], '\n') + 1
		for end < len(data) && (data[end] == ' ' || data[end] == '\t') {
			end += bytes.IndexByte(data[end:], '\n') + 1
		}
		if raw := data[start:end:end]; len(bytes.TrimSpace(raw)) > 0 {
			l := line{raw: raw}
			if err := l.split(folds.Replace(string(raw[:len(raw)-2]))); err != nil {
				return nil, err
			}
			if lines = append(lines, l); len(lines) > maxLines {
				return nil, fmt.Errorf("over %d lines (a calendar has fewer)", maxLines)
			}
		}
		start = end
	}
	return lines, nil
}

// split takes a line apart: the name ends at a semicolon or colon, the value
// begins after the first colon outside quotes.
func (l *line) split(text string) error {
	quoted := false
	end := strings.IndexAny(text, ":;")
	for i := max(end, 0); end > 0 && i < len(text); i++ {
		switch {
		case text[i] == '"':
			quoted = !quoted
		case text[i] == ':' && !quoted:
			l.name, l.value = strings.ToUpper(text[:end]), text[i+1:]
			return nil
		}
	}
	if len(text) > 40 {
		text = strings.ToValidUTF8(text[:40], "") + "..."
	}
	return fmt.Errorf("%q (NAME:VALUE, as iCalendar files have it)", text)
}

// components builds the tree.
func components(lines []line) (*part, error) {
	root := &part{}
	stack := []*part{root}
	for _, l := range lines {
		top := stack[len(stack)-1]
		switch l.name {
		case "BEGIN":
			if len(stack) > maxDepth {
				return nil, fmt.Errorf("BEGIN:%s nested deeper than %d", l.value, maxDepth)
			}
			p := &part{kind: strings.ToUpper(strings.TrimSpace(l.value)), begin: l}
			top.items = append(top.items, item{part: p})
			stack = append(stack, p)
		case "END":
			if top == root || top.kind != strings.ToUpper(strings.TrimSpace(l.value)) {
				return nil, fmt.Errorf("END:%s without its BEGIN", l.value)
			}
			top.end = l
			stack = stack[:len(stack)-1]
		default:
			if top == root {
				return nil, fmt.Errorf("%s outside a calendar (BEGIN:VCALENDAR)", l.name)
			}
			top.items = append(top.items, item{line: l})
		}
	}
	switch {
	case len(stack) > 1:
		return nil, fmt.Errorf("it ends inside %s (the file is cut short)", stack[len(stack)-1].kind)
	case len(root.items) != 1 || root.items[0].part.kind != "VCALENDAR":
		return nil, fmt.Errorf("%d components at the top (one VCALENDAR)", len(root.items))
	}
	return root.items[0].part, nil
}

// write puts the component together again.
func (p *part) write(b *bytes.Buffer) {
	b.Write(p.begin.raw)
	for _, i := range p.items {
		if i.part != nil {
			i.part.write(b)
		} else {
			b.Write(i.line.raw)
		}
	}
	b.Write(p.end.raw)
}

// parts are the components of a kind in the component.
func (p *part) parts(kind string) (all []*part) {
	for _, i := range p.items {
		if i.part != nil && i.part.kind == kind {
			all = append(all, i.part)
		}
	}
	return all
}

// value is that of the first property of a name, or nothing.
func (p *part) value(name string) string {
	for _, i := range p.items {
		if i.part == nil && i.line.name == name {
			return i.line.value
		}
	}
	return ""
}

// text is a property's value with its escapes undone (RFC 5545, 3.3.11).
func (p *part) text(name string) string {
	return strings.NewReplacer(`\\`, `\`, `\n`, "\n", `\N`, "\n", `\,`, ",", `\;`, ";").Replace(p.value(name))
}

// drop takes out the properties of some names.
func (p *part) drop(names ...string) {
	p.keep(func(i *item) bool { return i.part != nil || !has(names, i.line.name) })
}

// dropOwnAlarms takes out the alarms that gloam has written.
func (p *part) dropOwnAlarms() {
	p.keep(func(i *item) bool { return i.part == nil || i.part.value(alarmProperty) == "" })
}

func (p *part) keep(wanted func(*item) bool) {
	kept := p.items[:0]
	for _, i := range p.items {
		if wanted(&i) {
			kept = append(kept, i)
		}
	}
	p.items = kept
}

func has(names []string, name string) bool {
	for _, n := range names {
		if n == name {
			return true
		}
	}
	return false
}
