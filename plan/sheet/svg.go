package sheet

import (
	"fmt"
	"html/template"
	"math"
	"strings"

	"github.com/soniakeys/unit"
)

// svg gathers the text of a picture. Only numbers and escaped texts go in.
type svg struct{ strings.Builder }

func (s *svg) add(format string, args ...any) { fmt.Fprintf(s, format, args...) }

// open begins a picture of a size, with a title and a text that says the same
// for those who cannot see it.
func (s *svg) open(class, id string, width, height float64, title, text string) {
	s.add(`<svg class="%s" viewBox="0 0 %s %s" role="img" aria-labelledby="%s-t %s-d">`, class, num(width), num(height), id, id)
	s.add(`<title id="%s-t">%s</title><desc id="%s-d">%s</desc>`, id, escaped(title), id, escaped(text))
}

func (s *svg) close() template.HTML {
	s.add("</svg>")
	return template.HTML(s.String())
}

// text writes a label; anchor is start, middle or end.
func (s *svg) text(class string, x, y float64, anchor, text string) {
	s.add(`<text class="%s" x="%s" y="%s" text-anchor="%s">%s</text>`, class, num(x), num(y), anchor, escaped(text))
}

func (s *svg) line(class string, x1, y1, x2, y2 float64) {
	s.add(`<path class="%s" d="M%s %sL%s %s"/>`, class, num(x1), num(y1), num(x2), num(y2))
}

func (s *svg) rect(class string, x, y, width, height float64) {
	s.add(`<rect class="%s" x="%s" y="%s" width="%s" height="%s"/>`, class, num(x), num(y), num(width), num(height))
}

func (s *svg) circle(class string, x, y, r float64) {
	s.add(`<circle class="%s" cx="%s" cy="%s" r="%s"/>`, class, num(x), num(y), num(r))
}

// num writes a number to a tenth, the same for minus zero and zero.
func num(x float64) string {
	x = math.Round(x*10) / 10
	if x == 0 {
		x = 0
	}
	return strings.TrimSuffix(fmt.Sprintf("%.1f", x+0), ".0")
}

func escaped(text string) string { return template.HTMLEscapeString(text) }

// polar is the point at a distance from a centre towards a bearing, north up and
// y downwards.
func polar(cx, cy, r float64, bearing unit.Angle) (x, y float64) {
	sin, cos := bearing.Sincos()
	return cx + r*sin, cy - r*cos
}
