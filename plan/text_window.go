package plan

import (
	"fmt"
	"math"
	"sort"
	"strings"
	"unicode/utf8"

	"gloam/astro"
	"gloam/track/dm"
)

// round prints the sights in their order and the fix they give.
func (t *text) round(w *Window) {
	if len(w.Round) == 0 {
		return
	}
	t.line("")
	t.line("Round     UTC    Body              set Hs     Zn    bow   a minute  5 min late")
	for _, r := range w.Round {
		t.line("%s  %s  %-16s  %s  %s  %s  %+7.1f'   %s", t.shipTime(r.Time).Format("15:04:05"), r.Time.Format("15:04"),
			Candidate{Body: r.Body, Limb: r.Limb}.Label(), dm.Altitude(r.Preset), dm.Bearing(r.Azimuth), dm.Bearing(r.Relative), r.Rate.Min(), dm.Altitude(r.Late))
	}
	t.line("")
	t.line("Fix          error, NM  of the least  gaps      95 %% ellipse, NM")
	t.fix("round", w.RoundFix)
	if len(w.Triads) > 0 {
		t.fix("best triad", w.Triads[0].FixQuality)
	}
	t.fix("best pair", w.PairFix)
}

// fix prints what fix some sights give.
func (t *text) fix(what string, q FixQuality) {
	switch {
	case len(q.Bodies) < 2:
		return
	case math.IsInf(q.Covariance.ExpectedError(), 1):
		t.line("%-10s   none: the lines do not cross", what)
	default:
		t.line("%-10s   %-9.2f  %-12.2f  %-8s  %s", what, q.Covariance.ExpectedError(), q.Ratio, q.gaps(), q.Covariance.Ellipse())
	}
}

func (q FixQuality) gaps() string {
	return fmt.Sprintf("%.0f-%.0f°", q.LeastGap.Deg(), q.GreatestGap.Deg())
}

// String writes the half-axes in NM and the bearing of the longer one: "1.1 x
// 1.0 along 010°".
func (e Ellipse) String() string {
	return fmt.Sprintf("%.1f x %.1f along %s", e.SemiMajorNM, e.SemiMinorNM, dm.Bearing(e.Axis))
}

func (t *text) triads(w *Window) {
	if len(w.Triads) == 0 {
		return
	}
	t.line("")
	t.line("Triad                                gaps      error  95 %% ellipse, NM")
	for i, tr := range w.Triads {
		t.line("%d  %-32s  %-8s  %.2f  %s", i+1, tr.Names(), tr.gaps(), tr.Covariance.ExpectedError(), tr.Covariance.Ellipse())
	}
}

// Names gives the bodies' names in order.
func (q FixQuality) Names() string {
	return strings.Join(each(q.Bodies, astro.Body.String), ", ")
}

// bodies prints those of the triads listed, and all of them where there is no
// triad; the others follow in one paragraph.
func (t *text) bodies(w *Window) {
	if len(w.Bodies) == 0 {
		return
	}
	var others []string
	t.line("")
	t.line("Body              set Hs     Zn    Hc          mag  can be shot  in triads")
	for _, c := range w.Bodies {
		if !w.Listed(c.Body) {
			others = append(others, fmt.Sprintf("%v %.0f° %s", c.Body, c.Altitude.Deg(), dm.Bearing(c.Azimuth)))
			continue
		}
		t.line("%-16s  %s  %s  %s  %5.1f  %s-%s  %s", c.Label(), dm.Altitude(c.Preset), dm.Bearing(c.Azimuth), dm.Altitude(c.Altitude), c.Magnitude,
			t.ship(c.From), t.ship(c.To), w.in(c.Body))
	}
	if len(others) > 0 {
		sort.Strings(others)
		t.paragraph("Also up (Hc, Zn):", others)
	}
}

// Label names the body, and for the Moon the limb to bring to the horizon.
func (c Candidate) Label() string {
	if c.Limb == astro.Centre {
		return c.Body.String()
	}
	return fmt.Sprintf("%v %v limb", c.Body, c.Limb)
}

// Listed tells whether a body belongs to a triad listed, or there is none.
func (w *Window) Listed(b astro.Body) bool { return len(w.Triads) == 0 || w.in(b) != "" }

// in lists the numbers of the triads a body belongs to.
func (w *Window) in(b astro.Body) string {
	var in []string
	for i, tr := range w.Triads {
		for _, other := range tr.Bodies {
			if other == b {
				in = append(in, fmt.Sprint(i+1))
			}
		}
	}
	return strings.Join(in, " ")
}

// paragraph prints items, which are not broken, in lines of the text's width.
func (t *text) paragraph(lead string, items []string) {
	line := lead
	for i, item := range items {
		if i+1 < len(items) {
			item += ","
		}
		if utf8.RuneCountInString(line)+1+utf8.RuneCountInString(item) > textWidth {
			t.line("%s", line)
			line = " "
		}
		line += " " + item
	}
	t.line("%s", line)
}
