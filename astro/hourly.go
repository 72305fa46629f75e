package astro

import (
	"math"
	"time"

	"github.com/soniakeys/unit"
)

// Rates at which the trade's increments run, per hour of UT: Sun and planets,
// the Moon, and Aries (common practice, no published source).
var (
	sunRate   = unit.AngleFromDeg(15)
	moonRate  = unit.AngleFromMin(14*60 + 19.0)
	ariesRate = unit.AngleFromMin(15*60 + 2.46)
)

// Hourly is a body's place at a full hour with its changes over the hour that
// follows, as a table of hourly values gives them.
type Hourly struct {
	Time time.Time
	Body Body
	Place
	V   unit.Angle // gain of GHA on the body's rate; see HasV
	D   unit.Angle // change of declination, north positive; see HasD
	SHA unit.Angle // stars: sidereal hour angle, [0°, 360°)
}

// HasV tells whether a body has a v: the Moon and the planets.
func (b Body) HasV() bool { return b.Class() == ClassMoon || b.Class() == ClassPlanet }

// HasD tells whether a body has a d: the Sun, the Moon and the planets.
func (b Body) HasD() bool { return b.Class() == ClassSun || b.HasV() }

// NewHourly gives the hourly values of a body at an instant, which need not be
// a full hour, with ΔT from the function given.
//
// v is the change of GHA over the next hour less 15° for planets and 14° 19.0'
// for the Moon; the Sun is taken at 15° and has d alone, Aries and the stars
// have neither.
func NewHourly(b Body, t time.Time, deltaT func(time.Time) time.Duration) Hourly {
	now := NewMoment(t, deltaT(t))
	h := Hourly{Time: t, Body: b, Place: now.Place(b)}
	if b.Class() == ClassStar {
		h.SHA = circle(h.GHA.Rad() - now.gast)
	}
	if b.HasD() {
		next := t.Add(time.Hour)
		after := NewMoment(next, deltaT(next)).Place(b)
		h.D = after.Dec - h.Dec
		if b.HasV() {
			h.V = circle((after.GHA - h.GHA).Rad()) - b.rate()
		}
	}
	return h
}

// rate is how far a body's GHA runs in an hour by the trade's increments.
func (b Body) rate() unit.Angle {
	switch b.Class() {
	case ClassMoon:
		return moonRate
	case ClassPoint, ClassStar:
		return ariesRate
	}
	return sunRate
}

// Worked is a place found from hourly values as a navigator does it, each
// figure rounded to a hundredth of a minute: one figure more than printed
// tables have, so that rounding adds next to nothing to the method's error.
type Worked struct {
	Time        time.Time
	Hour        Hourly     // of the full hour, rounded; see Work for GHA
	Increment   unit.Angle // of GHA for minutes and seconds
	VCorrection unit.Angle
	DCorrection unit.Angle
	GHA, Dec    unit.Angle // the result; GHA in [0°, 360°)
	Direct      Place      // computed for Time itself
}

// Work finds a body's place at an instant from hourly values: GHA at the hour,
// increment, v correction; Dec with the d correction. For a star GHA at the
// hour is that of Aries, and its SHA is added. The Sun's is shifted by half of
// the v it has not, up to 0.16', as printed almanacs do (from memory).
//
// Against the place computed directly it is good to 0.04', for the Sun to 0.16':
// what is left of its missing v, and the unevenness of v and d within the hour.
func Work(b Body, t time.Time, deltaT func(time.Time) time.Duration) Worked {
	hour := t.UTC().Truncate(time.Hour)
	w := Worked{Time: t.UTC(), Hour: NewHourly(b, hour, deltaT), Direct: NewMoment(t, deltaT(t)).Place(b)}
	switch b.Class() {
	case ClassStar:
		w.Hour.GHA -= w.Hour.SHA
	case ClassSun:
		end := NewMoment(hour.Add(time.Hour), deltaT(hour)).Place(b)
		w.Hour.GHA += (circle((end.GHA - w.Hour.GHA).Rad()) - sunRate).Div(2)
	}
	w.Hour = w.Hour.rounded()
	part := t.Sub(hour).Hours()
	w.Increment = hundredth(b.rate().Mul(part))
	w.VCorrection, w.DCorrection = hundredth(w.Hour.V.Mul(part)), hundredth(w.Hour.D.Mul(part))
	w.GHA = circle((w.Hour.GHA + w.Increment + w.VCorrection + w.Hour.SHA).Rad())
	w.Dec = w.Hour.Dec + w.DCorrection
	return w
}

// rounded is the hour's values to a hundredth of a minute.
func (h Hourly) rounded() Hourly {
	for _, a := range []*unit.Angle{&h.GHA, &h.Dec, &h.SHA, &h.V, &h.D} {
		*a = hundredth(*a)
	}
	h.GHA = circle(h.GHA.Rad())
	return h
}

// hundredth rounds an angle to a hundredth of a minute.
func hundredth(a unit.Angle) unit.Angle { return unit.AngleFromMin(math.Round(a.Min()*100) / 100) }
