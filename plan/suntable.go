package plan

import (
	"sync"
	"time"

	"github.com/soniakeys/unit"

	"gloam/astro"
	"gloam/track"
)

// sunTable is the Sun as seen from the ship at the whole minutes of a day, each
// worked out when it is first asked for. It is for one goroutine.
type sunTable struct {
	sky  *sky
	set  *Settings
	from time.Time // the first minute
	rows []sunRow

	lines []sunLine // for the choice of Sun lines
}

// sunRow is one minute.
type sunRow struct {
	known             bool
	fix               track.Fix
	sailed            float64 // NM
	altitude, azimuth unit.Angle
}

// tables keeps the storage of tables no longer used: a day's is large.
var tables = sync.Pool{New: func() any { return new(sunTable) }}

// sunTable is that of a day, for as long as it is not freed.
func (s *sky) sunTable(d *Day, set *Settings) *sunTable {
	t := tables.Get().(*sunTable)
	t.sky, t.set, t.from = s, set, d.From.Truncate(time.Minute)
	if t.from.Before(d.From) {
		t.from = t.from.Add(time.Minute)
	}
	n := 0
	if t.from.Before(d.To) {
		n = int(d.To.Sub(t.from)/time.Minute) + 1
	}
	t.rows, t.lines = cleared(t.rows, n), cleared(t.lines, n)
	return t
}

func (t *sunTable) free() { tables.Put(t) }

// cleared is a list of n zeros, in the storage of another where that is enough.
func cleared[T any](list []T, n int) []T {
	if cap(list) < n {
		return make([]T, n)
	}
	list = list[:n]
	clear(list)
	return list
}

func (t *sunTable) time(i int) time.Time { return t.from.Add(time.Duration(i) * time.Minute) }

// minute is the row of an instant, within the table.
func (t *sunTable) minute(at time.Time) int {
	return min(max(int(at.Sub(t.from)/time.Minute), 0), len(t.rows)-1)
}

// at is the row of minute i.
func (t *sunTable) at(i int) *sunRow {
	r := &t.rows[i]
	if !r.known {
		at := t.time(i)
		r.known, r.fix = true, t.sky.passage.At(at)
		r.sailed = t.sky.passage.SailedNM(at)
		r.altitude, r.azimuth = t.sky.ephemeris.Place(astro.Sun, at).From(r.fix.Lat, r.fix.Lon)
	}
	return r
}

// usable tells whether the Sun can be shot.
func (t *sunTable) usable(i int) bool {
	h := t.at(i).altitude
	return h >= t.set.LowestAltitude && h <= t.set.HighestAltitude
}

// sight is that of the Sun at minute i.
func (t *sunTable) sight(i int) Sight {
	r := t.at(i)
	return Sight{r.azimuth, t.set.sightError(r.altitude)}
}
