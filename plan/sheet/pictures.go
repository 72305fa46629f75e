package sheet

import (
	"fmt"
	"html/template"
	"math"

	"github.com/soniakeys/unit"

	"gloam/plan"
)

// moon draws the Moon's phase with its lit side as it stands in the sky.
func moon(id string, m plan.MoonPhase) template.HTML {
	const r = 15.0
	s := &svg{}
	s.open("moon", id, 36, 36, "Moon", m.Words()+", as it stands when highest")
	s.add(`<g transform="rotate(%s 18 18)">`, num(m.Tilt.Deg()-90))
	s.circle("moon-dark", 18, 18, r)
	// The lit part: half the disc to the right, and the terminator's half ellipse.
	width, sweep := r*math.Abs(2*m.Illuminated-1), 0
	if m.Illuminated > 0.5 {
		sweep = 1
	}
	s.add(`<path class="moon-lit" d="M18 %sA%s %s 0 0 1 18 %sA%s %s 0 0 %d 18 %sZ"/>`, num(18-r), num(r), num(r), num(18+r), num(width), num(r), sweep, num(18-r))
	s.add("</g>")
	return s.close()
}

// fixPicture draws the lines of position of a round and the ellipse of its fix,
// true to scale.
func fixPicture(id string, w *plan.Window) template.HTML {
	const size, middle = 120.0, 60.0
	e := w.RoundFix.Covariance.Ellipse()
	if len(w.Round) < 2 || math.IsInf(e.SemiMajorNM, 0) || math.IsNaN(e.SemiMajorNM) {
		return ""
	}
	scale := 40 / math.Max(e.SemiMajorNM, 0.5) // pixels a mile
	s := &svg{}
	s.open("fix", id, size, size+14, "Expected fix", "95 % ellipse of half-axes "+e.String()+" and the lines of position, true to scale")
	for _, r := range w.Round {
		x1, y1 := polar(middle, middle, 56, r.Azimuth+unit.AngleFromDeg(90))
		x2, y2 := polar(middle, middle, 56, r.Azimuth-unit.AngleFromDeg(90))
		s.line("lop", x1, y1, x2, y2)
	}
	s.add(`<ellipse class="ellipse" cx="60" cy="60" rx="%s" ry="%s" transform="rotate(%s 60 60)"/>`,
		num(e.SemiMinorNM*scale), num(e.SemiMajorNM*scale), num(e.Axis.Deg()))
	mile := barMiles(scale)
	s.line("scale", middle-mile*scale/2, size+1, middle+mile*scale/2, size+1)
	s.text("note", middle, size+12, "middle", fmt.Sprintf("%v NM", mile))
	return s.close()
}

// barMiles is a round number of miles some thirty pixels long.
func barMiles(scale float64) float64 {
	for _, m := range []float64{0.2, 0.5, 1, 2, 5, 10, 20, 50, 100} {
		if m*scale >= 24 {
			return m
		}
	}
	return 200
}
