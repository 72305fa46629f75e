package plan

import (
	"fmt"
	"math"
	"time"

	"github.com/soniakeys/unit"

	"gloam/astro"
	"gloam/track"
	"gloam/track/dm"
)

// sunLines chooses two times of a day whose lines, run on or back to noon, give
// the best running fix.
type sunLines struct {
	*sunTable
	noon  int     // the minute of noon; below 0 where the day has none, and the fix is at the second line
	miles float64 // sailed at noon
}

// sunLine is a line of the Sun at one minute, run to noon.
type sunLine struct {
	known, usable bool
	information
}

// sight is a line with the error of its run to where so many miles are sailed.
func (l *sunLines) run(i int, miles float64) Sight {
	g := l.sight(i)
	return Sight{g.Azimuth, unit.AngleFromMin(math.Hypot(g.Error.Min(), l.set.RunError*math.Abs(l.at(i).sailed-miles)))}
}

// pair are the sights of two lines, run to noon or to the second of them.
func (l *sunLines) pair(i, j int) []Sight {
	miles := l.miles
	if l.noon < 0 {
		miles = l.at(j).sailed
	}
	return []Sight{l.run(i, miles), l.run(j, miles)}
}

// line is a line run to noon.
func (l *sunLines) line(i int) *sunLine {
	line := &l.lines[i]
	if !line.known {
		line.known, line.usable = true, l.usable(i)
		if line.usable && l.noon >= 0 {
			line.information = l.run(i, l.miles).information()
		}
	}
	return line
}

// error is the expected error of the running fix, squared; endless for a pair
// that cannot be: one line on either side of noon, or where there is none in
// order.
func (l *sunLines) error(i, j int) float64 {
	if i >= j || !l.line(i).usable || !l.line(j).usable || l.noon >= 0 && (i > l.noon || j <= l.noon) {
		return math.Inf(1)
	}
	both := l.line(i).information.add(l.line(j).information)
	if l.noon < 0 {
		pair := l.pair(i, j)
		both = pair[0].information().add(pair[1].information())
	}
	return both.square(commonWeight(l.set.CommonError))
}

// best finds the pair of minutes with the least error: on a coarse grid, then on
// finer ones around the best until it moves no more.
func (l *sunLines) best() (i, j int, ok bool) {
	least, last := math.Inf(1), len(l.rows)-1
	try := func(fromA, toA, fromB, toB, step int) (better bool) {
		for a := max(fromA, 0); a <= min(toA, last); a += step {
			if !l.line(a).usable {
				continue
			}
			for b := max(fromB, 0); b <= min(toB, last); b += step {
				if x := l.error(a, b); x < least-1e-9 {
					i, j, least, better = a, b, x, true
				}
			}
		}
		return better
	}
	try(0, last, 0, last, coarse)
	for _, step := range []int{3, 1} { // out to nine minutes, then to three
		for try(i-3*step, i+3*step, j-3*step, j+3*step, step) {
		}
	}
	return i, j, !math.IsInf(least, 1)
}

// slack is by how much the error may grow before a time is no longer in the
// span of a Sun line.
const slack = 1.1

// span is how far the time of one line may shift, the other kept, in steps of
// five minutes.
func (l *sunLines) span(i int, error func(int) float64) (from, to time.Time) {
	most := slack * slack * error(i)
	a, b := i, i
	for a >= 5 && error(a-5) <= most {
		a -= 5
	}
	for b < len(l.rows)-5 && error(b+5) <= most {
		b += 5
	}
	return l.time(a), l.time(b)
}

// sunLines are the day's two Sun lines, where it has any.
func (t *sunTable) sunLines(d *Day, clock *track.Clock) []Item {
	l := &sunLines{sunTable: t, noon: -1}
	for _, e := range d.Events {
		if e.Kind == MeridianPassage && len(t.rows) > 0 {
			l.noon, l.miles = t.minute(e.Time), t.sky.passage.SailedNM(e.Time)
		}
	}
	i, j, ok := l.best()
	if !ok && l.noon >= 0 { // the Sun can be shot on one side of noon only
		l.noon = -1
		clear(l.lines)
		i, j, ok = l.best()
	}
	if !ok {
		return nil
	}
	return l.items(i, j, clock)
}

func (l *sunLines) items(i, j int, clock *track.Clock) []Item {
	quality := l.set.quality([]astro.Body{astro.Sun, astro.Sun}, l.pair(i, j))
	where := "at the second line"
	if l.noon >= 0 {
		where = "at noon"
	}
	word := func(other int) string {
		return fmt.Sprintf("With %s ship: lines cross at %.0f°, running fix %s %.2f NM, 95 %% ellipse %s", clock.At(l.time(other)).Format("15:04"),
			crossingAngle(l.at(i).azimuth, l.at(j).azimuth).Deg(), where, quality.Covariance.ExpectedError(), quality.Covariance.Ellipse())
	}
	first := l.item(i, word(j), &quality, func(k int) float64 { return l.error(k, j) })
	second := l.item(j, word(i), &quality, func(k int) float64 { return l.error(i, k) })
	first.Title, second.Title = "Sun line, forenoon", "Sun line, afternoon"
	if l.noon < 0 {
		first.Title, second.Title = "Sun line, first of two", "Sun line, second of two"
	}
	return []Item{first, second}
}

func (l *sunLines) item(i int, word string, quality *FixQuality, error func(int) float64) Item {
	s, best, own := l.sky, l.time(i), l.sight(i)
	item := Item{Kind: SunLines, Best: best, Fix: s.passage.At(best), Quality: quality, ExpectedNM: quality.Covariance.ExpectedError()}
	item.Begin, item.End = l.span(i, error)
	item.Sights = []RoundSight{s.sight(&Candidate{Body: astro.Sun, Limb: astro.Lower}, best, l.set)}
	item.Words = []string{word, fmt.Sprintf("This line alone: %.2f NM along %s; with the DR %.1f NM",
		math.Hypot(own.Error.Min(), l.set.CommonError.Min()), dm.Bearing(own.Azimuth), l.set.withDR(own))}
	return item
}

// withDR is the expected error of the DR position after one line.
func (set *Settings) withDR(g Sight) float64 {
	weight := 1 / (set.DRError * set.DRError)
	sum := g.information().add(information{cc: weight, ss: weight})
	return math.Sqrt(sum.square(commonWeight(set.CommonError)))
}

// crossingAngle is that between two lines of position, 0° to 90°.
func crossingAngle(a, b unit.Angle) unit.Angle {
	x := unit.Angle(math.Abs(math.Remainder((a - b).Rad(), 2*math.Pi)))
	return min(x, math.Pi-x)
}
