package plan

import (
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
}

// sunRow is one minute.
type sunRow struct {
	known             bool
	fix               track.Fix
	sailed            float64 // NM
	altitude, azimuth unit.Angle
}

func (s *sky) sunTable(d *Day, set *Settings) *sunTable {
	from := d.From.Truncate(time.Minute)
	if from.Before(d.From) {
		from = from.Add(time.Minute)
	}
	if !from.Before(d.To) {
		return &sunTable{sky: s, set: set, from: from}
	}
	return &sunTable{s, set, from, make([]sunRow, int(d.To.Sub(from)/time.Minute)+1)}
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
