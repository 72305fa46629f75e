package astro

import (
	"math"
	"runtime"
	"sync"
	"sync/atomic"
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
	for _, b := range Bodies() {
		step := 48 * time.Hour
		if b == Moon {
			step = 12 * time.Hour
		}
		e.bodies[b] = newSamples(step, from, to)
	}
	var tasks []func()
	moon := e.bodies[Moon]
	for i := range moon.rows { // but for how it looks
		tasks = append(tasks, func() {
			t := moon.time(i)
			f := newFrame(t, deltaT(t))
			moon.rows[i] = f.sample(f.moon())
		})
	}
	for i := range e.bodies[Sun].rows {
		tasks = append(tasks, func() { e.fillSlow(i, deltaT) })
	}
	onAllCores(tasks)
	e.lightMoon()
	return e
}

// fillSlow fills in one row of all bodies but the Moon.
func (e *Ephemeris) fillSlow(i int, deltaT func(time.Time) time.Duration) {
	t := e.bodies[Sun].time(i)
	m := NewMoment(t, deltaT(t))
	for _, b := range Bodies() {
		if b != Moon {
			e.bodies[b].rows[i] = m.sample(m.Place(b))
		}
	}
}

func onAllCores(tasks []func()) {
	var group sync.WaitGroup
	var next atomic.Int64
	for range runtime.GOMAXPROCS(0) {
		group.Go(func() {
			for i := next.Add(1) - 1; i < int64(len(tasks)); i = next.Add(1) - 1 {
				tasks[i]()
			}
		})
	}
	group.Wait()
}

// lightMoon fills in how the Moon looks, which takes the Sun's place.
func (e *Ephemeris) lightMoon() {
	for i := range e.bodies[Moon].rows {
		t := e.bodies[Moon].time(i)
		row := &e.bodies[Moon].rows[i]
		p := e.place(*row, e.sidereal(t)).litBy(e.Place(Sun, t))
		row[6], row[7] = p.Magnitude, p.Illuminated
	}
}

// newSamples starts so far before a span that its beginning lies in the middle
// of the rows used, and ends so far after it.
func newSamples(step time.Duration, from, to time.Time) samples {
	s := samples{start: from.Add(-points / 2 * step), step: step}
	n := math.Ceil(float64(to.Sub(s.start))/float64(step)) + points/2
	s.rows = make([]sample, int(n))
	return s
}

// time is the instant of a row.
func (s *samples) time(i int) time.Time { return s.start.Add(time.Duration(i) * s.step) }

func (f *frame) sample(p Place) sample {
	d := spherical(f.gast-p.GHA.Rad(), p.Dec.Rad())
	return sample{d[0], d[1], d[2], f.equinoxes(), p.HP.Rad(), p.SD.Rad(), p.Magnitude, p.Illuminated}
}

// Place gives the place of a body at an instant of the span.
func (e *Ephemeris) Place(b Body, t time.Time) Place {
	return e.place(e.bodies[b].at(t), e.sidereal(t))
}

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
