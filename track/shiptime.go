package track

import (
	"fmt"
	"math"
	"regexp"
	"strconv"
	"strings"
	"time"

	"github.com/soniakeys/unit"
)

// ShipTime is a rule by which a ship keeps her clock: the shifts of a passage
// in order, of which there is one at least.
type ShipTime func(*Passage) []Shift

// ZoneOffset is ship's time less UTC in the 15° band of a longitude: whole
// hours, -12 to 12. A longitude on the boundary, to 1e-9°, belongs to the band
// farther from Greenwich; the 12th band is split by the sign of the longitude.
func ZoneOffset(lon unit.Angle) time.Duration {
	return time.Duration(math.Round(math.Round(lon.Deg()*1e9)/15e9)) * time.Hour
}

// NauticalTime keeps on each ship's day the zone in which the ship lies at
// local mean noon. The clock is shifted at midnight, by an hour at most: the
// midnight nearest to where the zone is entered.
func NauticalTime(p *Passage) []Shift {
	offset := ZoneOffset(p.At(p.Departure).Lon)
	midnight := dateOf(p.Departure, offset).Add(-offset)
	offset = ZoneOffset(p.At(p.localNoon(midnight.Add(day / 2))).Lon)
	shifts := []Shift{{p.Departure, offset}}
	for {
		if midnight = dateOf(midnight, offset).Add(day - offset); midnight.After(p.Arrival) {
			return shifts
		}
		if !midnight.After(p.Departure) {
			continue
		}
		zone := ZoneOffset(p.At(p.localNoon(midnight.Add(day / 2))).Lon)
		step := min(max(shorter(zone-offset), -time.Hour), time.Hour)
		next := inZones(offset+step, zone)
		if next == offset {
			continue
		}
		if begin := midnight.Add(-step); step < 0 && next != offset+step {
			// Put back, the old date is lived on for an hour, then the date line counts.
			shifts = append(shifts, Shift{midnight, offset + step}, Shift{begin, next})
		} else {
			shifts = append(shifts, Shift{midnight, next})
		}
		if offset = next; step < 0 {
			midnight = midnight.Add(-step)
		}
	}
}

// shorter is a step of the clock taken the shorter way round.
func shorter(step time.Duration) time.Duration {
	if step > day/2 {
		return step - day
	}
	if step <= -day/2 {
		return step + day
	}
	return step
}

// inZones brings an offset into -12 to 12 h; of the two twelves it takes the
// one on the side of the zone steered for.
func inZones(offset, zone time.Duration) time.Duration {
	switch {
	case offset > day/2 || offset == day/2 && zone < 0:
		return offset - day
	case offset < -day/2 || offset == -day/2 && zone > 0:
		return offset + day
	}
	return offset
}

// localNoon is the instant within six hours of guess at which local mean time
// on board is 12:00. Noons step by a day and shift with the ship's longitude;
// the bound of six hours holds close to a pole, where longitude runs wild.
func (p *Passage) localNoon(guess time.Time) time.Time {
	noon := guess
	for range 5 {
		lmt := noon.Add(hoursToDuration(p.At(noon).Lon.Deg() / 15))
		noon = noon.Add(day/2 - lmt.Sub(lmt.Truncate(day)))
	}
	return earlier(later(noon, guess.Add(-day/4)), guess.Add(day/4))
}

// FixedTime keeps one offset.
func FixedTime(offset time.Duration) ShipTime {
	return func(p *Passage) []Shift { return []Shift{{p.Departure, offset}} }
}

// ZoneTime keeps the civil time of a place ashore.
func ZoneTime(loc *time.Location) ShipTime {
	return func(p *Passage) (shifts []Shift) {
		for t := p.Departure; ; {
			local := t.In(loc)
			_, seconds := local.Zone()
			shifts = append(shifts, Shift{t, time.Duration(seconds) * time.Second})
			_, end := local.ZoneBounds()
			if end.IsZero() || end.After(p.Arrival) {
				return shifts
			}
			t = end.UTC()
		}
	}
}

// DateOffset is the offset kept from the midnight on which a ship's date would
// begin by the clock kept until then.
type DateOffset struct {
	Date   time.Time // 00:00 UTC of the date
	Offset time.Duration
}

// ListedTime shifts the clock on the dates listed, which are in order. Until
// the first it keeps the nautical zone of the place of departure.
func ListedTime(list []DateOffset) ShipTime {
	return func(p *Passage) []Shift {
		shifts := []Shift{{p.Departure, ZoneOffset(p.At(p.Departure).Lon)}}
		for _, l := range list {
			last := &shifts[len(shifts)-1]
			at := l.Date.Add(-last.Offset)
			if !at.After(last.At) {
				last.Offset = l.Offset
			} else {
				shifts = append(shifts, Shift{at, l.Offset})
			}
		}
		return shifts
	}
}

const shipTimeForms = `auto, utc, an offset as -03:00, a zone name as Atlantic/Azores, or dates with the offset from then on, as "2026-11-24=-02:00,2026-11-28=-03:00"`

// ParseShipTime reads a rule: "auto" (nautical zones), "utc", an offset of
// ship's time from UTC, the name of a zone in the tz database, or a list of
// dates with offsets, in order.
func ParseShipTime(text string) (ShipTime, error) {
	switch text = strings.TrimSpace(text); {
	case text == "auto":
		return NauticalTime, nil
	case strings.EqualFold(text, "utc"):
		return FixedTime(0), nil
	case strings.Contains(text, "="):
		return parseListed(text)
	}
	if offset, err := parseOffset(text); err == nil {
		return FixedTime(offset), nil
	}
	if loc, err := time.LoadLocation(text); err == nil && text != "" && text != "Local" {
		return ZoneTime(loc), nil
	}
	return nil, fmt.Errorf("%q (%s)", text, shipTimeForms)
}

func parseListed(text string) (ShipTime, error) {
	var list []DateOffset
	for _, item := range strings.Split(text, ",") {
		date, offset, _ := strings.Cut(strings.TrimSpace(item), "=")
		d, err := time.Parse(time.DateOnly, date)
		if err != nil {
			return nil, fmt.Errorf("%q: date %q (as 2026-11-24=-02:00)", item, date)
		}
		o, err := parseOffset(offset)
		if err != nil {
			return nil, fmt.Errorf("%q: %w", item, err)
		}
		if n := len(list); n > 0 && !d.After(list[n-1].Date) {
			return nil, fmt.Errorf("%q: after %s (dates in order)", item, list[n-1].Date.Format(time.DateOnly))
		}
		list = append(list, DateOffset{d, o})
	}
	return ListedTime(list), nil
}

var offsetForm = regexp.MustCompile(`^(?:UTC)?([+-])(\d{1,2})(?::?([0-5]\d))?$`)

// parseOffset reads ship's time less UTC: -3, +05:30, UTC-3; at most 14 h.
func parseOffset(text string) (time.Duration, error) {
	m := offsetForm.FindStringSubmatch(strings.TrimSpace(text))
	if m == nil {
		return 0, fmt.Errorf("offset %q (as -03:00 or +5:30)", text)
	}
	hours, _ := strconv.Atoi(m[2])
	minutes, _ := strconv.Atoi("0" + m[3])
	offset := time.Duration(hours)*time.Hour + time.Duration(minutes)*time.Minute
	if offset > 14*time.Hour {
		return 0, fmt.Errorf("offset %q (at most 14 hours)", text)
	}
	if m[1] == "-" {
		offset = -offset
	}
	return offset, nil
}
