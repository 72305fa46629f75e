package track

import (
	"fmt"
	"math"
)

// Lines of many points, as tracks have them, are thinned: no point of the line
// lies farther from the thinned one than ThinnedNM. Where all points have
// times, the ship is no farther from it than that at any of these times.
const (
	ThinnedNM    = 0.05
	thinnedOver  = 1000  // points
	maxWaypoints = 10000 // after thinning
)

func tooMany(n int) error {
	return &Error{"line", fmt.Sprintf("over %d points", n), fmt.Sprintf("at most %d, after thinning to %v NM", maxWaypoints, ThinnedNM),
		"export the route alone, or a part of the track"}
}

// Thinning goes in up to three passes that share the tolerance: as a file is
// read, block by block, and as one line. Blocks are of a length that no line,
// however jagged, takes long.
var (
	whileReading = thinning{1024, ThinnedNM * 0.2}
	whenRead     = thinning{1024, ThinnedNM * 0.2}
	atLast       = thinning{4096, ThinnedNM * 0.6}
)

type thinning struct {
	block       int // points
	toleranceNM float64
}

// thin leaves out points by the rule of Douglas & Peucker (Canadian
// Cartographer 10, 112, 1973), with distances at equal times where there are
// times (Meratnia & de By, EDBT 2004).
func thin(line []Waypoint) []Waypoint {
	if line = whenRead.of(line); len(line) > 2*maxWaypoints {
		return line
	}
	return atLast.of(line)
}

func (pass thinning) of(line []Waypoint) (kept []Waypoint) {
	t := newThinner(line, pass.toleranceNM)
	for from := 0; from < len(line)-1; from += pass.block {
		t.span(from, min(from+pass.block, len(line)-1))
	}
	for i, keep := range t.keep {
		if keep {
			kept = append(kept, line[i])
		}
	}
	return kept
}

// gathered is a line as it is read, thinned behind the last block of points, so
// that a long track does not fill the memory.
type gathered struct {
	kept, fresh []Waypoint
	count       int
}

func (g *gathered) add(w Waypoint) {
	g.count++
	if g.fresh = append(g.fresh, w); len(g.fresh) > whileReading.block {
		last := len(g.fresh) - 1
		kept := whileReading.of(g.fresh)
		g.kept = append(g.kept, kept[:len(kept)-1]...)
		g.fresh = append(g.fresh[:0], g.fresh[last])
	}
}

func (g *gathered) line() []Waypoint { return append(g.kept, g.fresh...) }

// thinner has the points on Mercator's chart, where rhumb lines are straight.
type thinner struct {
	points      []chartPoint
	keep        []bool
	timed       bool
	toleranceNM float64
}

// chartPoint is a point on the chart: longitude counted on across ±180°,
// isometric latitude, both in radians; how many radians a mile of the parallel
// has; meridian arc in NM; hours.
type chartPoint struct{ lon, psi, rate, arc, hours float64 }

func newThinner(line []Waypoint, toleranceNM float64) *thinner {
	t := &thinner{make([]chartPoint, len(line)), make([]bool, len(line)), true, toleranceNM}
	for i := range line {
		w := &line[i]
		lat := w.Lat.Rad()
		p := chartPoint{w.Lon.Rad(), isometric(lat), parallelRate(lat), meridianArc(lat), w.ETA.Sub(line[0].ETA).Hours()}
		if i > 0 {
			before := t.points[i-1]
			p.lon = before.lon + wrap(w.Lon-line[i-1].Lon).Rad()
			t.timed = t.timed && p.hours >= before.hours
		}
		t.points[i] = p
		t.timed = t.timed && !w.ETA.IsZero()
		t.keep[i] = i == 0 || i == len(line)-1 || w.Name != "" || w.Stay != 0 || !w.ETD.IsZero() || w.SpeedKn != 0 || w.Sailing != nil
	}
	return t
}

// span keeps the ends of a span, and inside it what strays too far.
func (t *thinner) span(from, to int) {
	t.keep[from], t.keep[to] = true, true
	type part struct{ from, to int }
	for stack := []part{{from, to}}; len(stack) > 0; {
		p := stack[len(stack)-1]
		stack = stack[:len(stack)-1]
		if worst, nm := t.farthest(p.from, p.to); nm > t.toleranceNM {
			t.keep[worst] = true
			stack = append(stack, part{p.from, worst}, part{worst, p.to})
		}
	}
}

// farthest finds the point between two others that strays farthest from the
// line between them; one to be kept counts as endlessly far.
func (t *thinner) farthest(from, to int) (worst int, nm float64) {
	for i := from + 1; i < to; i++ {
		d := math.Inf(1)
		if !t.keep[i] {
			d = t.distance(&t.points[from], &t.points[to], &t.points[i])
		}
		if d > nm {
			worst, nm = i, d
		}
	}
	return worst, nm
}

// distance is how far a point lies from the rhumb line from a to b, in NM: from
// the nearest point of it, or from the ship that sails it.
func (t *thinner) distance(a, b, p *chartPoint) float64 {
	north, east := b.psi-a.psi, b.lon-a.lon
	f := 0.0
	if t.timed && b.hours > a.hours {
		f = (p.hours - a.hours) / (b.hours - a.hours)
		off := p.arc - (a.arc + f*(b.arc-a.arc)) // north of the ship, NM
		along := f
		if math.Abs(north) > 1e-9 {
			along = (p.psi - off*p.rate - a.psi) / north
		}
		return math.Hypot(off, (p.lon-(a.lon+along*east))/p.rate)
	}
	if long := north*north + east*east; long > 0 {
		f = math.Min(math.Max(((p.psi-a.psi)*north+(p.lon-a.lon)*east)/long, 0), 1)
	}
	return math.Hypot(p.psi-(a.psi+f*north), p.lon-(a.lon+f*east)) / p.rate
}
