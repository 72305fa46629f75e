package astro

import (
	"time"

	"github.com/soniakeys/unit"
)

// Table holds a body's places at even steps over a span, for the many instants
// that a search asks for. Between the steps it interpolates through six of
// them, within 0.001' of [Moment.Place].
type Table struct {
	start time.Time
	step  time.Duration
	rows  []tableRow
	dt    float64 // ΔT at the middle of the span, days
}

// tableRow is what changes slowly: direction on the true equator of date,
// parallax, and the equation of the equinoxes (all radians).
type tableRow struct {
	direction vector
	hp, ee    float64
}

// points is how many rows one interpolation uses.
const points = 6

// NewTable prepares places of a body of the solar system from one instant to
// another, with ΔT from the function given.
func NewTable(b Body, from, to time.Time, deltaT func(time.Time) time.Duration) *Table {
	tb := &Table{step: 24 * time.Hour}
	if b == Moon {
		tb.step = 6 * time.Hour
	}
	tb.start = from.Add(-points / 2 * tb.step)
	tb.dt = deltaT(from.Add(to.Sub(from)/2)).Seconds() / 86400
	for t := tb.start; t.Before(to.Add(points / 2 * tb.step)); t = t.Add(tb.step) {
		m := NewMoment(t, deltaT(t))
		p := m.Place(b)
		tb.rows = append(tb.rows, tableRow{
			direction: spherical(m.gast-p.GHA.Rad(), p.Dec.Rad()),
			hp:        p.HP.Rad(),
			ee:        m.dpsi * cos(m.obliq),
		})
	}
	return tb
}

// Place gives GHA, Dec and HP at an instant of the span; the rest of the Place
// is zero.
func (tb *Table) Place(t time.Time) Place {
	x := float64(t.Sub(tb.start)) / float64(tb.step)
	first := min(max(int(x)-points/2+1, 0), len(tb.rows)-points)
	var r tableRow
	for i, w := range lagrange(x - float64(first)) {
		row := &tb.rows[first+i]
		for k := range r.direction {
			r.direction[k] += w * row.direction[k]
		}
		r.hp += w * row.hp
		r.ee += w * row.ee
	}
	ut := daysSinceJ2000(t)
	ra, dec := r.direction.lonLat()
	gast := siderealTime(ut, (ut+tb.dt)/36525) + r.ee
	return Place{GHA: circle(gast - ra), Dec: unit.Angle(dec), HP: unit.Angle(r.hp)}
}

// lagrange gives the weights of six values at 0, 1 ... 5 for the value at x
// (Meeus ch. 3, with the factorials worked out).
func lagrange(x float64) (w [points]float64) {
	scale := [points]float64{-120, 24, -12, 12, -24, 120}
	for i := range w {
		p := 1.0
		for j := range w {
			if j != i {
				p *= x - float64(j)
			}
		}
		w[i] = p / scale[i]
	}
	return w
}
