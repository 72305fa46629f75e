package astro

import (
	"math"
	"sync"
	"time"

	"github.com/soniakeys/unit"
)

// Sky gives the places of bodies at one instant: a [Moment], or what
// [Ephemeris.At] gives.
type Sky interface {
	Place(Body) Place
}

// Ephemeris holds the places of all bodies at even steps over a span, for the
// many instants that a search asks for. Between the steps it interpolates
// through six of them, within 0.001' of [Moment.Place].
type Ephemeris struct {
	days   float64   // ΔT at the middle of the span, in days
	bodies []samples // by Body
}

// samples are a body's at even steps.
type samples struct {
	start time.Time
	step  time.Duration
	rows  []sample
}

// sample is what changes slowly: direction on the true equator of date (three
// numbers), equation of the equinoxes, HP, SD, magnitude, lit part.
type sample [8]float64

// points is how many rows one interpolation uses.
const points = 6

// NewEphemeris prepares the span from one instant to another, with ΔT from the
// function given.
func NewEphemeris(from, to time.Time, deltaT func(time.Time) time.Duration) *Ephemeris {
	e := &Ephemeris{days: deltaT(from.Add(to.Sub(from)/2)).Hours() / 24, bodies: make([]samples, len(Bodies()))}
	var moon sync.WaitGroup
	moon.Go(func() { e.bodies[Moon] = moonSamples(from, to, deltaT) })
	slow := newSamples(48*time.Hour, from, to)
	times := slow.times(to)
	for _, b := range Bodies() {
		if b != Moon {
			e.bodies[b] = slow
			e.bodies[b].rows = make([]sample, len(times))
		}
	}
	for i, t := range times {
		m := NewMoment(t, deltaT(t))
		for _, b := range Bodies() {
			if b != Moon {
				e.bodies[b].rows[i] = m.sample(m.Place(b))
			}
		}
	}
	moon.Wait()
	e.lightMoon()
	return e
}

// moonSamples are the Moon's, but for how it looks.
func moonSamples(from, to time.Time, deltaT func(time.Time) time.Duration) samples {
	s := newSamples(12*time.Hour, from, to)
	for _, t := range s.times(to) {
		f := newFrame(t, deltaT(t))
		s.rows = append(s.rows, f.sample(f.moon()))
	}
	return s
}

// lightMoon fills in how the Moon looks, which takes the Sun's place.
func (e *Ephemeris) lightMoon() {
	for i := range e.bodies[Moon].rows {
		t := e.bodies[Moon].start.Add(time.Duration(i) * e.bodies[Moon].step)
		row := &e.bodies[Moon].rows[i]
		p := e.place(*row, e.sidereal(t)).litBy(e.Place(Sun, t))
		row[6], row[7] = p.Magnitude, p.Illuminated
	}
}

// newSamples starts so far before a span that its beginning lies in the middle
// of the rows used.
func newSamples(step time.Duration, from, to time.Time) samples {
	return samples{start: from.Add(-points / 2 * step), step: step}
}

// times are the instants of the rows that a span to the instant given needs.
func (s samples) times(to time.Time) (all []time.Time) {
	for t := s.start; t.Before(to.Add(points / 2 * s.step)); t = t.Add(s.step) {
		all = append(all, t)
	}
	return all
}

func (f *frame) sample(p Place) sample {
	d := spherical(f.gast-p.GHA.Rad(), p.Dec.Rad())
	return sample{d[0], d[1], d[2], f.equinoxes(), p.HP.Rad(), p.SD.Rad(), p.Magnitude, p.Illuminated}
}

// Place gives the place of a body at an instant of the span.
func (e *Ephemeris) Place(b Body, t time.Time) Place { return e.place(e.bodies[b].at(t), e.sidereal(t)) }

// sidereal is mean sidereal time at an instant.
func (e *Ephemeris) sidereal(t time.Time) float64 {
	ut := daysSinceJ2000(t)
	return siderealTime(ut, (ut+e.days)/36525)
}

// place turns a sample to the hour angle of an instant.
func (e *Ephemeris) place(s sample, sidereal float64) Place {
	ra, dec := vector(s[:3]).lonLat()
	return Place{circle(sidereal + s[3] - ra), unit.Angle(dec), unit.Angle(s[4]), unit.Angle(s[5]), s[6], s[7]}
}

// at interpolates.
func (s *samples) at(t time.Time) sample { return s.mean(s.blend(t)) }

// blend is how the rows of an instant are weighed: those from first on.
type blend struct {
	first   int
	weights [points]float64
}

func (s *samples) blend(t time.Time) blend {
	x := float64(t.Sub(s.start)) / float64(s.step)
	first := min(max(int(math.Floor(x))-points/2+1, 0), len(s.rows)-points)
	return blend{first, lagrange(x - float64(first))}
}

func (s *samples) mean(b blend) (mean sample) {
	for i, w := range b.weights {
		for k, v := range s.rows[b.first+i] {
			mean[k] += w * v
		}
	}
	return mean
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

// At gives the places of all bodies at an instant of the span.
func (e *Ephemeris) At(t time.Time) Sky {
	return &instant{e, t, e.sidereal(t), e.bodies[Sun].blend(t)}
}

// instant shares what the bodies have in common: sidereal time, and (but for
// the Moon) the steps of their samples.
type instant struct {
	ephemeris *Ephemeris
	time      time.Time
	sidereal  float64
	slow      blend
}

func (i *instant) Place(b Body) Place {
	s := &i.ephemeris.bodies[b]
	if b == Moon {
		return i.ephemeris.place(s.at(i.time), i.sidereal)
	}
	return i.ephemeris.place(s.mean(i.slow), i.sidereal)
}
