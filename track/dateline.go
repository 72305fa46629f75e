package track

import (
	"math"
	"time"
)

// DateLine gives the instants at which the ship crosses the meridian of 180°,
// to a second.
func (p *Passage) DateLine() (all []time.Time) {
	for i := range p.Legs {
		l := &p.Legs[i]
		turn := wrap(l.To.Lon - l.From.Lon).Deg()
		// Longitude counted on from the leg's beginning, without a jump.
		run := func(t time.Time) float64 {
			return math.Abs(l.From.Lon.Deg() + wrapDeg(l.place(t).Lon.Deg()-l.From.Lon.Deg()))
		}
		if math.Abs(l.From.Lon.Deg()+turn) <= 180 || l.Stays() {
			continue
		}
		a, b := l.ETD, l.ETA
		for b.Sub(a) > time.Second {
			if mid := a.Add(b.Sub(a) / 2); run(mid) > 180 {
				b = mid
			} else {
				a = mid
			}
		}
		all = append(all, b)
	}
	return all
}
