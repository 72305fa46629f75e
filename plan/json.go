package plan

import (
	"encoding/json"
	"io"
	"math"
	"slices"
	"time"

	"gloam/astro"
	"gloam/track"
)

// Format names the plan's JSON. New fields may be added to it; none changes
// its meaning.
const Format = "gloam/plan/1"

// Version is gloam's own.
const Version = "0.1.0"

// WriteJSON writes the plan as JSON of the format [Format], one object, with the
// kinds asked for in the days' programmes.
func (p *Plan) WriteJSON(w io.Writer, kinds []ItemKind) error {
	enc := json.NewEncoder(w)
	enc.SetEscapeHTML(false)
	enc.SetIndent("", " ")
	return enc.Encode(jsonPlan{
		Format: Format, Version: Version,
		Voyage:   voyageJSON(p.Passage),
		Observer: p.Settings.json(), Choices: p.Settings.choices(),
		Events:   each(p.Events(), p.eventJSON),
		Windows:  each(p.Windows(), p.windowJSON),
		Days:     each(p.Days, func(d Day) jsonDay { return dayJSON(d, kinds) }),
		Notes:    append([]string{}, p.Notes...),
		Cautions: Cautions,
	})
}

// each turns every element of a list; the result is never nil, so that an
// empty list prints as one.
func each[A, B any](list []A, f func(A) B) []B {
	out := make([]B, len(list))
	for i, x := range list {
		out[i] = f(x)
	}
	return out
}

func voyageJSON(p *track.Passage) jsonVoyage {
	v := jsonVoyage{Name: p.Name, Departure: utc(p.Departure), Arrival: utc(p.Arrival), Distance: miles(p.DistanceNM)}
	for _, l := range p.Legs {
		v.Legs = append(v.Legs, jsonLeg{
			From: pointJSON(l.From), To: pointJSON(l.To), Sailing: l.Sailing.String(), Course: turn(l.Course),
			Distance: miles(l.DistanceNM), Speed: brief(l.SpeedKn), ETD: utc(l.ETD), ETA: utc(l.ETA),
		})
	}
	return v
}

func pointJSON(w track.Waypoint) jsonPoint { return jsonPoint{w.Name, deg(w.Lat), east(w.Lon)} }

func (set Settings) json() jsonObserver {
	return jsonObserver{
		Eye: brief(set.EyeM), IndexError: arcmin(set.IndexError), Temperature: brief(set.TemperatureC),
		Pressure: brief(set.PressureHPa), SightError: arcmin(set.SightError), CommonError: arcmin(set.CommonError),
	}
}

func (set Settings) choices() jsonChoices {
	return jsonChoices{
		Lowest: deg(set.LowestAltitude), Highest: deg(set.HighestAltitude), UpperSun: deg(set.UpperSun), LowerSun: deg(set.LowerSun),
		HorizonAway: deg(set.HorizonAway), HorizonUnder: deg(set.HorizonUnder), Gain: brief(set.TelescopeGain), Humidity: brief(set.Humidity),
		Clouds: each(set.Clouds, arcJSON), Blind: each(set.Blind, arcJSON), Without: each(set.Without, astro.Body.String),
		Sights: set.Sights, Pace: brief(set.Pace.Seconds()), Loss: brief(set.Loss), DRError: miles(set.DRError),
	}
}

func arcJSON(a Arc) [2]deg { return [2]deg{deg(a.From), deg(a.To)} }

func (p *Plan) eventJSON(e Event) jsonEvent {
	return jsonEvent{e.Kind, utc(e.Time), utc(p.Clock.At(e.Time)), deg(e.Lat), east(e.Lon)}
}

func (p *Plan) windowJSON(w Window) jsonWindow {
	_, seconds := p.Clock.At(w.Best).Zone()
	return jsonWindow{
		ID: w.ID, Kind: w.Kind, Begin: utc(w.Begin), End: utc(w.End), Best: utc(w.Best),
		Lat: deg(w.Fix.Lat), Lon: east(w.Fix.Lon), Course: turn(w.Fix.Course), Speed: brief(w.Fix.SpeedKn),
		Offset: offset(time.Duration(seconds) * time.Second),
		Bodies: each(w.Bodies, bodyJSON), Triads: each(w.Triads, triadJSON), Round: each(w.Round, sightJSON),
		UsableBegin: maybe(w.Usable[0]), UsableEnd: maybe(w.Usable[1]),
		RoundFix: qualityJSON(w.RoundFix), PairFix: qualityJSON(w.PairFix),
		Comment: w.Comment(), Warnings: append([]string{}, w.Warnings...),
	}
}

// maybe is null for the zero time.
func maybe(t time.Time) *utc {
	if t.IsZero() {
		return nil
	}
	u := utc(t)
	return &u
}

func sightJSON(r RoundSight) jsonSight {
	return jsonSight{
		Body: r.Body.String(), Time: utc(r.Time), Altitude: deg(r.Altitude), Azimuth: turn(r.Azimuth), Relative: turn(r.Relative),
		Preset: deg(r.Preset), Limb: r.Limb.String(), Rate: arcmin(r.Rate), Late: deg(r.Late),
	}
}

// qualityJSON is null where the sights give no fix.
func qualityJSON(q FixQuality) *jsonQuality {
	if len(q.Bodies) == 0 || math.IsInf(q.Covariance.ExpectedError(), 1) {
		return nil
	}
	return &jsonQuality{
		Bodies: each(q.Bodies, astro.Body.String), LeastGap: deg(q.LeastGap), GreatestGap: deg(q.GreatestGap),
		Error: miles(q.Covariance.ExpectedError()), Ellipse: ellipseJSON(q.Covariance), Ratio: brief(q.Ratio),
	}
}

func ellipseJSON(c Covariance) jsonEllipse {
	e := c.Ellipse()
	return jsonEllipse{miles(e.SemiMajorNM), miles(e.SemiMinorNM), turn(e.Axis)}
}

func bodyJSON(c Candidate) jsonBody {
	return jsonBody{
		Body: c.Body.String(), Class: c.Body.Class(), Magnitude: brief(c.Magnitude),
		Altitude: deg(c.Altitude), Azimuth: turn(c.Azimuth), GHA: turn(c.GHA), Dec: deg(c.Dec),
		Preset: deg(c.Preset), Limb: c.Limb.String(), From: utc(c.From), To: utc(c.To),
	}
}

func triadJSON(t Triad) *jsonQuality { return qualityJSON(t.FixQuality) }

func itemJSON(m Item) jsonItem {
	j := jsonItem{
		ID: m.ID, Kind: m.Kind, Title: m.Title, Begin: utc(m.Begin), Best: utc(m.Best), End: utc(m.End), Lat: deg(m.Fix.Lat), Lon: east(m.Fix.Lon),
		Bodies: []string{}, Sights: each(m.Sights, sightJSON), Checks: each(m.Checks, checkJSON), Error: miles(m.ExpectedNM), Words: append([]string{}, m.Words...),
	}
	for _, r := range m.Sights {
		j.Bodies = append(j.Bodies, r.Body.String())
	}
	for _, c := range m.Checks {
		j.Bodies = append(j.Bodies, c.Body.String())
	}
	if m.Quality != nil {
		j.Fix = qualityJSON(*m.Quality)
	}
	return j
}

func checkJSON(c Check) jsonCheck {
	return jsonCheck{
		Body: c.Body.String(), Time: utc(c.Time), Altitude: deg(c.Altitude), True: turn(c.True), Variation: deg(c.Variation),
		Magnetic: turn(c.Magnetic), Relative: turn(c.Relative), Doubtful: c.Doubtful,
	}
}

func dayJSON(d Day, kinds []ItemKind) jsonDay {
	var programme []Item
	for _, item := range d.Programme {
		if slices.Contains(kinds, item.Kind) {
			programme = append(programme, item)
		}
	}
	return jsonDay{
		Date: d.Date.Format(time.DateOnly), Offset: offset(d.Offset), Begin: utc(d.From), End: utc(d.To),
		Illuminated: brief(d.Moon.Illuminated), Waxing: d.Moon.Waxing, NoWindow: d.NoWindow,
		Programme: each(programme, itemJSON),
		Remains:   each(d.Remains, func(r Remain) jsonRemain { return jsonRemain{r.Body.String(), utc(r.Highest), deg(r.Altitude)} }),
	}
}
