package calendars

import (
	"bytes"
	"regexp"
	"strings"
	"unicode/utf8"
)

// escape writes a text as a value of type TEXT (RFC 5545, 3.3.11).
func escape(text string) string {
	return strings.NewReplacer(`\`, `\\`, "\n", `\n`, ",", `\,`, ";", `\;`).Replace(text)
}

// newLine makes a content line, folded at 75 octets between characters.
func newLine(name, value string) item {
	var b bytes.Buffer
	room := 75
	for text := name + ":" + value; len(text) > 0; {
		n := min(room, len(text))
		for n < len(text) && !utf8.RuneStart(text[n]) {
			n--
		}
		b.WriteString(text[:n])
		b.WriteString("\r\n")
		if text = text[n:]; len(text) > 0 {
			b.WriteByte(' ')
		}
		room = 74
	}
	return item{line: line{raw: b.Bytes(), name: name, value: value}}
}

// The lines that gloam writes into texts, by their beginnings or forms, so that
// what a user added among them is known from them.
var ownLines = regexp.MustCompile(`^(Ship's time |(Begin|Best|End|Use|until) +\d|Mind: |Sun from |DR |Course |Lying still|Best: |Gaps |Expected error|95 % ellipse|Round, ship's time|At best: |` +
	`(Sunrise|Sunset|Civil|Nautical|Moonrise|Moonset|Meridian) |\d\d:\d\d:\d\d |(Morning|Evening|Midnight|Midday) stars: |Sun |` +
	`(Mon|Tues|Wednes|Thurs|Fri|Satur|Sun)day \d+ \pL+ \d{4}$|[A-Z][\pL' ]* -?\d.* Zn |Greatest altitude|Sun (north|south) of|Only |With |This line alone|Lines cross|Set the preset|Never sweep|Either limb|true |Amplitude |Variation not|Doubtful|Errors are|The Sun |Nothing to shoot|One body only|Two bodies only|Time for \d)`)

func isOurs(l string) bool { return ownLines.MatchString(l) }

var digits = regexp.MustCompile(`\d+`)

// form is a line without its figures.
func form(l string) string { return digits.ReplaceAllString(strings.TrimSpace(l), "#") }
