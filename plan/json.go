package plan

import (
	"encoding/json"
	"io"
	"math"
	"strconv"
	"time"

	"github.com/soniakeys/unit"

	"gloam/astro"
	"gloam/track"
)

// Format names the plan's JSON. New fields may be added to it; none changes
// its meaning.
const Format = "gloam/plan/1"

// Version is gloam's own.
const Version = "0.1.0"

// decimals prints a number with a fixed count of decimals; the types below
// say how many.
func decimals(x float64, places int) []byte {
	if rounded(x, places) == 0 {
		x = 0 // no minus zero
	}
	return strconv.AppendFloat(nil, x, 'f', places, 64)
}

func rounded(x float64, places int) float64 {
	scale := math.Pow10(places)
	return math.Round(x*scale) / scale
}

type (
	deg    unit.Angle    // degrees, 5 decimals
	turn   unit.Angle    // the same for directions: never 360
	east   unit.Angle    // the same for longitudes: never -180
	arcmin unit.Angle    // minutes of arc, 2 decimals
	miles  float64       // nautical miles, 3 decimals
	brief  float64       // other numbers, 2 decimals
	utc    time.Time     // RFC 3339 to the second
	offset time.Duration // ±hh:mm
)

func (a deg) MarshalJSON() ([]byte, error) { return decimals(unit.Angle(a).Deg(), 5), nil }
func (a turn) MarshalJSON() ([]byte, error) {
	return decimals(math.Mod(rounded(unit.Angle(a).Deg(), 5), 360), 5), nil
}

func (a east) MarshalJSON() ([]byte, error) {
	d := rounded(unit.Angle(a).Deg(), 5)
	if d <= -180 {
		d += 360
	}
	return decimals(d, 5), nil
}
func (a arcmin) MarshalJSON() ([]byte, error) { return decimals(unit.Angle(a).Min(), 2), nil }
func (m miles) MarshalJSON() ([]byte, error)  { return decimals(float64(m), 3), nil }
func (b brief) MarshalJSON() ([]byte, error)  { return decimals(float64(b), 2), nil }
func (t utc) MarshalJSON() ([]byte, error) {
	return json.Marshal(time.Time(t).Round(time.Second).Format(time.RFC3339))
}

func (o offset) MarshalJSON() ([]byte, error) {
	zone := time.FixedZone("", int(time.Duration(o).Seconds()))
	return json.Marshal(time.Unix(0, 0).In(zone).Format("-07:00"))
}

type jsonPlan struct {
	Format   string       `json:"format"`
	Version  string       `json:"version"`
	Voyage   jsonVoyage   `json:"voyage"`
	Observer jsonObserver `json:"observer"`
	Events   []jsonEvent  `json:"events"`
	Windows  []jsonWindow `json:"windows"`
	Days     []jsonDay    `json:"days"`
	Notes    []string     `json:"notes"`
	Cautions []string     `json:"cautions"`
}

type jsonVoyage struct {
	Name      string    `json:"name"`
	Departure utc       `json:"departure"`
	Arrival   utc       `json:"arrival"`
	Distance  miles     `json:"distance_nm"`
	Legs      []jsonLeg `json:"legs"`
}

type jsonPoint struct {
	Name string `json:"name"`
	Lat  deg    `json:"lat"`
	Lon  east   `json:"lon"`
}

type jsonLeg struct {
	From     jsonPoint `json:"from"`
	To       jsonPoint `json:"to"`
	Sailing  string    `json:"sailing"`
	Course   turn      `json:"course_deg"`
	Distance miles     `json:"distance_nm"`
	Speed    brief     `json:"speed_kn"`
	ETD      utc       `json:"etd"`
	ETA      utc       `json:"eta"`
}

type jsonObserver struct {
	Eye         brief  `json:"eye_m"`
	IndexError  arcmin `json:"index_error_arcmin"`
	Temperature brief  `json:"temperature_c"`
	Pressure    brief  `json:"pressure_hpa"`
	SightError  arcmin `json:"sight_error_arcmin"`
	CommonError arcmin `json:"common_error_arcmin"`
}

type jsonEvent struct {
	Kind     EventKind `json:"kind"`
	Time     utc       `json:"time"`
	ShipTime utc       `json:"ship_time"`
	Lat      deg       `json:"lat"`
	Lon      east      `json:"lon"`
}

type jsonWindow struct {
	ID          string       `json:"id"`
	Kind        WindowKind   `json:"kind"`
	Begin       utc          `json:"begin"`
	End         utc          `json:"end"`
	Best        utc          `json:"best"`
	Lat         deg          `json:"lat"`
	Lon         east         `json:"lon"`
	Course      turn         `json:"course_deg"`
	Speed       brief        `json:"speed_kn"`
	Offset      offset       `json:"ship_time_offset"`
	Bodies      []jsonBody   `json:"bodies"`
	Triads      []jsonTriad  `json:"triads"`
	Round       []jsonSight  `json:"round"`
	UsableBegin *utc         `json:"usable_begin"` // null where never
	UsableEnd   *utc         `json:"usable_end"`
	RoundFix    *jsonQuality `json:"round_fix"` // null where there is no round
	PairFix     *jsonQuality `json:"pair_fix"`
	Comment     string       `json:"comment"`
	Warnings    []string     `json:"warnings"`
}

type jsonSight struct {
	Body     string `json:"body"`
	Time     utc    `json:"time"`
	Altitude deg    `json:"altitude_deg"`
	Azimuth  turn   `json:"azimuth_deg"`
	Relative turn   `json:"relative_deg"`
	Preset   deg    `json:"preset_deg"`
	Limb     string `json:"limb"`
	Rate     arcmin `json:"rate_arcmin_per_min"`
	Late     deg    `json:"preset_5_min_late_deg"`
}

type jsonQuality struct {
	Bodies      []string    `json:"bodies"`
	LeastGap    deg         `json:"least_gap_deg"`
	GreatestGap deg         `json:"greatest_gap_deg"`
	Error       miles       `json:"expected_error_nm"`
	Ellipse     jsonEllipse `json:"ellipse"`
	Ratio       brief       `json:"ratio_to_floor"`
}

type jsonBody struct {
	Body      string      `json:"body"`
	Class     astro.Class `json:"class"`
	Magnitude brief       `json:"magnitude"`
	Altitude  deg         `json:"altitude_deg"`
	Azimuth   turn        `json:"azimuth_deg"`
	GHA       turn        `json:"gha_deg"`
	Dec       deg         `json:"dec_deg"`
	Preset    deg         `json:"preset_deg"`
	Limb      string      `json:"limb"`
	From      utc         `json:"from"`
	To        utc         `json:"to"`
}

type jsonTriad struct {
	Bodies      [3]string   `json:"bodies"`
	LeastGap    deg         `json:"least_gap_deg"`
	GreatestGap deg         `json:"greatest_gap_deg"`
	Error       miles       `json:"expected_error_nm"`
	Ellipse     jsonEllipse `json:"ellipse"`
	Ratio       brief       `json:"ratio_to_floor"`
}

type jsonEllipse struct {
	SemiMajor miles `json:"semi_major_nm"`
	SemiMinor miles `json:"semi_minor_nm"`
	Axis      turn  `json:"axis_deg"`
}

type jsonDay struct {
	Date        string       `json:"ship_date"`
	Offset      offset       `json:"ship_time_offset"`
	Begin       utc          `json:"begin"`
	End         utc          `json:"end"`
	Illuminated brief        `json:"moon_illuminated_fraction"`
	Waxing      bool         `json:"moon_waxing"`
	NoWindow    string       `json:"no_window"`
	Remains     []jsonRemain `json:"remains"`
}

type jsonRemain struct {
	Body     string `json:"body"`
	Time     utc    `json:"highest"`
	Altitude deg    `json:"altitude_deg"`
}

// WriteJSON writes the plan as JSON of the format [Format], one object.
func (p *Plan) WriteJSON(w io.Writer) error {
	enc := json.NewEncoder(w)
	enc.SetEscapeHTML(false)
	enc.SetIndent("", " ")
	return enc.Encode(jsonPlan{
		Format: Format, Version: Version,
		Voyage:   voyageJSON(p.Passage),
		Observer: p.Settings.json(),
		Events:   each(p.Events(), p.eventJSON),
		Windows:  each(p.Windows(), p.windowJSON),
		Days:     each(p.Days, dayJSON),
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
	for i, l := range p.Legs {
		v.Legs = append(v.Legs, jsonLeg{
			From: pointJSON(l.From), To: pointJSON(l.To), Sailing: l.Sailing.String(), Course: turn(l.Course),
			Distance: miles(l.DistanceNM), Speed: brief(p.SpeedKn), ETD: utc(p.ETD(i)), ETA: utc(p.ETD(i + 1)),
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

func triadJSON(t Triad) jsonTriad {
	q := t.FixQuality
	return jsonTriad{
		Bodies: [3]string(each(q.Bodies, astro.Body.String)), LeastGap: deg(q.LeastGap), GreatestGap: deg(q.GreatestGap),
		Error: miles(q.Covariance.ExpectedError()), Ellipse: ellipseJSON(q.Covariance), Ratio: brief(q.Ratio),
	}
}

func dayJSON(d Day) jsonDay {
	return jsonDay{
		Date: d.Date.Format(time.DateOnly), Offset: offset(d.Offset), Begin: utc(d.From), End: utc(d.To),
		Illuminated: brief(d.Moon.Illuminated), Waxing: d.Moon.Waxing, NoWindow: d.NoWindow,
		Remains: each(d.Remains, func(r Remain) jsonRemain { return jsonRemain{r.Body.String(), utc(r.Highest), deg(r.Altitude)} }),
	}
}
