package plan

import (
	"encoding/json"
	"math"
	"strconv"
	"time"

	"github.com/soniakeys/unit"

	"gloam/astro"
)

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
	Choices  jsonChoices  `json:"choices"`
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

// jsonChoices is what the user asked of the sky and of the round.
type jsonChoices struct {
	Lowest       deg      `json:"lowest_altitude_deg"`
	Highest      deg      `json:"highest_altitude_deg"`
	UpperSun     deg      `json:"upper_sun_deg"`
	LowerSun     deg      `json:"lower_sun_deg"`
	HorizonAway  deg      `json:"horizon_away_deg"`
	HorizonUnder deg      `json:"horizon_under_deg"`
	Gain         brief    `json:"telescope_gain"`
	Humidity     brief    `json:"humidity"`
	Clouds       [][2]deg `json:"clouds_deg"` // true bearings, clockwise
	Blind        [][2]deg `json:"blind_deg"`  // from the bow
	Without      []string `json:"without"`
	Sights       int      `json:"sights"`
	Pace         brief    `json:"pace_s"`
	Loss         brief    `json:"loss"`
	DRError      miles    `json:"dr_error_nm"`
}

type jsonEvent struct {
	Kind     EventKind `json:"kind"`
	Time     utc       `json:"time"`
	ShipTime utc       `json:"ship_time"`
	Lat      deg       `json:"lat"`
	Lon      east      `json:"lon"`
}

type jsonWindow struct {
	ID          string         `json:"id"`
	Kind        WindowKind     `json:"kind"`
	Begin       utc            `json:"begin"`
	End         utc            `json:"end"`
	Best        utc            `json:"best"`
	Lat         deg            `json:"lat"`
	Lon         east           `json:"lon"`
	Course      turn           `json:"course_deg"`
	Speed       brief          `json:"speed_kn"`
	Offset      offset         `json:"ship_time_offset"`
	Bodies      []jsonBody     `json:"bodies"`
	Triads      []*jsonQuality `json:"triads"`
	Round       []jsonSight    `json:"round"`
	UsableBegin *utc           `json:"usable_begin"` // null where never
	UsableEnd   *utc           `json:"usable_end"`
	RoundFix    *jsonQuality   `json:"round_fix"` // null where there is no round
	PairFix     *jsonQuality   `json:"pair_fix"`
	Comment     string         `json:"comment"`
	Warnings    []string       `json:"warnings"`
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
	Programme   []jsonItem   `json:"programme"`
	Remains     []jsonRemain `json:"remains"`
}

// jsonItem is an item of the programme.
type jsonItem struct {
	ID     string       `json:"id"`
	Kind   ItemKind     `json:"kind"`
	Title  string       `json:"title"`
	Begin  utc          `json:"begin"`
	Best   utc          `json:"best"`
	End    utc          `json:"end"`
	Lat    deg          `json:"lat"`
	Lon    east         `json:"lon"`
	Bodies []string     `json:"bodies"`
	Sights []jsonSight  `json:"sights"` // with presets and bearings
	Checks []jsonCheck  `json:"checks"` // of the compass
	Error  miles        `json:"expected_error_nm"`
	Fix    *jsonQuality `json:"fix"` // null where there is none
	Words  []string     `json:"words"`
}

type jsonCheck struct {
	Body      string `json:"body"`
	Time      utc    `json:"time"`
	Altitude  deg    `json:"altitude_deg"`
	True      turn   `json:"true_deg"`
	Variation deg    `json:"variation_deg"` // east positive
	Magnetic  turn   `json:"magnetic_deg"`
	Relative  turn   `json:"relative_deg"`
	Doubtful  string `json:"doubtful"`
}

type jsonRemain struct {
	Body     string `json:"body"`
	Time     utc    `json:"highest"`
	Altitude deg    `json:"altitude_deg"`
}
