package plan

import (
	"fmt"
	"io"
	"sort"
	"time"

	"github.com/soniakeys/unit"

	"gloam/astro"
	"gloam/track"
	"gloam/track/dm"
)

// Report is what can be shot at one instant and place, and what cannot and why.
type Report struct {
	Time     time.Time
	Fix      track.Fix
	Settings Settings
	Sun      unit.Angle // altitude of the Sun's centre
	Moon     MoonPhase
	Bodies   []BodyReport // in order of bearing, above the horizon
	Window   Window       // from Time on, as long as the round takes
}

// BodyReport is a body above the horizon.
type BodyReport struct {
	Candidate
	Hidden string // why it cannot be shot; empty where it can
}

// NewReport looks at the sky at an instant from a position, course and speed
// (knots, 0 for a ship at rest).
func NewReport(t time.Time, from track.Position, course unit.Angle, speedKn float64, set Settings) (*Report, error) {
	if err := set.Validate(); err != nil {
		return nil, err
	}
	length := max(time.Duration(set.Sights)*set.Pace, 10*time.Minute)
	passage, err := track.Ahead(from, course, speedKn, t, length+late+time.Minute)
	if err != nil {
		return nil, err
	}
	s := newSky(passage, set.DeltaT)
	at := s.ephemeris.At(t)
	r := &Report{Time: t.UTC(), Fix: passage.At(t), Settings: set, Moon: s.moonPhase(t, t)}
	l := set.lookout(at, t, r.Fix)
	r.Sun = l.sun.Altitude
	r.Bodies = set.reports(at, &l)
	w := &r.Window
	w.Kind, w.Begin, w.End, w.Best = s.kind(t, t.Add(length)), t, t.Add(length), t
	w.Fix = r.Fix
	s.fill(w, &set)
	return r, nil
}

// reports lists the bodies above the horizon, the Sun too.
func (set *Settings) reports(sky astro.Sky, l *lookout) []BodyReport {
	var all []BodyReport
	for _, b := range append([]astro.Body{astro.Sun}, shootable...) {
		p := sky.Place(b)
		hc, zn := p.From(l.fix.Lat, l.fix.Lon)
		if hc < 0 {
			continue
		}
		all = append(all, BodyReport{set.candidate(sky, b, l.fix.Position), l.hidden(b, p.Magnitude, hc, zn)})
	}
	sort.SliceStable(all, func(i, j int) bool { return all[i].Azimuth < all[j].Azimuth })
	return all
}

// WriteText prints the report for a person; see [Plan.WriteText].
func (r *Report) WriteText(w io.Writer, bold bool) error {
	zone := time.FixedZone("", int(track.ZoneOffset(r.Fix.Lon).Seconds()))
	t := &text{shipTime: func(at time.Time) time.Time { return at.In(zone) }, bold: bold}
	t.line("%s", t.strong(fmt.Sprintf("%v  %s", r.Fix.Position, r.Time.Format("2006-01-02 15:04:05 UTC"))))
	t.line("Ship's time %s, %s. Course %s, %.1f kn.", t.shipTime(r.Time).Format("2006-01-02 15:04"),
		ZoneText(track.ZoneOffset(r.Fix.Lon)), dm.Bearing(r.Fix.Course), r.Fix.SpeedKn)
	t.line("Sun at %s. Moon %s.", dm.Altitude(r.Sun), r.Moon.Words())
	t.sextant(&r.Settings)
	t.line("")
	t.line("Zn    bow   Body              Hc          mag  ")
	for _, b := range r.Bodies {
		t.line("%s  %s  %-16v  %s  %5.1f  %s", dm.Bearing(b.Azimuth), dm.Bearing(b.Azimuth-r.Fix.Course), b.Body, dm.Altitude(b.Altitude), b.Magnitude, b.Hidden)
	}
	if len(r.Bodies) == 0 {
		t.line("Nothing stands above the horizon.")
	}
	t.sights(&r.Window)
	t.cautions()
	_, err := w.Write(t.Bytes())
	return err
}
