package plan

import (
	"bytes"
	"encoding/json"
	"math"
	"regexp"
	"slices"
	"strings"
	"testing"
	"time"

	"github.com/soniakeys/unit"
)

// written gives a voyage's plan as JSON and as decoded from it.
func written(t *testing.T, v voyage) (string, map[string]any) {
	t.Helper()
	var b bytes.Buffer
	if err := planOf(t, v.passage, DefaultSettings()).WriteJSON(&b, UsualKinds); err != nil {
		t.Fatal(err)
	}
	var m map[string]any
	if err := json.Unmarshal(b.Bytes(), &m); err != nil {
		t.Fatal(err)
	}
	return b.String(), m
}

// fields is every member that the format promises, by the object it stands in.
var fields = map[string]string{
	"":               "format version voyage observer choices events windows days notes cautions",
	"voyage":         "name departure arrival distance_nm legs",
	"legs":           "from to sailing course_deg distance_nm speed_kn etd eta",
	"from":           "name lat lon",
	"to":             "name lat lon",
	"observer":       "eye_m index_error_arcmin temperature_c pressure_hpa sight_error_arcmin common_error_arcmin",
	"events":         "kind time ship_time lat lon",
	"windows":        "id kind begin end best lat lon course_deg speed_kn ship_time_offset bodies triads round usable_begin usable_end round_fix pair_fix comment warnings",
	"windows bodies": "body class magnitude altitude_deg azimuth_deg gha_deg dec_deg preset_deg limb from to",
	"triads":         "bodies least_gap_deg greatest_gap_deg expected_error_nm ellipse ratio_to_floor",
	"round_fix":      "bodies least_gap_deg greatest_gap_deg expected_error_nm ellipse ratio_to_floor",
	"pair_fix":       "bodies least_gap_deg greatest_gap_deg expected_error_nm ellipse ratio_to_floor",
	"round":          "body time altitude_deg azimuth_deg relative_deg preset_deg limb rate_arcmin_per_min preset_5_min_late_deg",
	"choices":        "lowest_altitude_deg highest_altitude_deg upper_sun_deg lower_sun_deg horizon_away_deg horizon_under_deg telescope_gain humidity clouds_deg blind_deg without sights pace_s loss dr_error_nm",
	"ellipse":        "semi_major_nm semi_minor_nm axis_deg",
	"days":           "ship_date ship_time_offset begin end moon_illuminated_fraction moon_waxing no_window programme remains",
	"programme":      "id kind title begin best end lat lon bodies sights checks expected_error_nm fix words",
	"sights":         "body time altitude_deg azimuth_deg relative_deg preset_deg limb rate_arcmin_per_min preset_5_min_late_deg",
	"fix":            "bodies least_gap_deg greatest_gap_deg expected_error_nm ellipse ratio_to_floor",
	"checks":         "body time altitude_deg true_deg variation_deg magnetic_deg relative_deg doubtful",
	"remains":        "body highest altitude_deg",
}

// walk calls f for every object below x with the name of the member it is in.
func walk(x any, name string, f func(string, map[string]any)) {
	switch v := x.(type) {
	case map[string]any:
		f(name, v)
		for k, below := range v {
			if name == "windows" && k == "bodies" {
				k = "windows bodies"
			}
			walk(below, k, f)
		}
	case []any:
		for _, below := range v {
			walk(below, name, f)
		}
	}
}

func TestJSONHasEveryField(t *testing.T) {
	for _, v := range readVoyages(t) {
		_, m := written(t, v)
		walk(m, "", func(name string, o map[string]any) {
			want := strings.Fields(fields[name])
			for _, k := range want {
				if o[k] == nil && k != "fix" { // null where there is none
					t.Errorf("%s: %q has no %s", v.name, name, k)
				}
			}
			if len(o) != len(want) {
				t.Errorf("%s: %q has %d members, want %d", v.name, name, len(o), len(want))
			}
		})
	}
}

// Ranges as the project's conventions give them.
func TestJSONRanges(t *testing.T) {
	ranges := map[string][2]float64{
		"lat": {-90, 90}, "lon": {-179.99999, 180}, "course_deg": {0, 359.99999}, "azimuth_deg": {0, 359.99999},
		"gha_deg": {0, 359.99999}, "dec_deg": {-90, 90}, "altitude_deg": {10, 74}, "preset_deg": {10, 75},
		"axis_deg": {0, 180}, "least_gap_deg": {0, 180}, "greatest_gap_deg": {60, 360}, "relative_deg": {0, 359.99999}, "moon_illuminated_fraction": {0, 1},
	}
	for _, v := range readVoyages(t) {
		text, m := written(t, v)
		walk(m, "", func(name string, o map[string]any) {
			for k, x := range o {
				r, ok := ranges[k]
				if ok = ok && (name == "windows bodies" || name == "round" || k != "altitude_deg" && k != "preset_deg"); ok && (x.(float64) < r[0] || x.(float64) > r[1]) {
					t.Errorf("%s: %s %s is %v, outside %v", v.name, name, k, x, r)
				}
			}
		})
		for _, degrees := range regexp.MustCompile(`"(?:lat|lon|\w+_deg)": (-?[\d.]+)`).FindAllStringSubmatch(text, -1) {
			if _, d, _ := strings.Cut(degrees[1], "."); len(d) != 5 {
				t.Fatalf("%s: %s has not five decimals", v.name, degrees[0])
			}
		}
	}
}

func TestJSONTimes(t *testing.T) {
	for _, v := range readVoyages(t) {
		_, m := written(t, v)
		last := ""
		walk(m["events"], "events", func(_ string, o map[string]any) {
			at, ship := instant(t, o["time"].(string)), instant(t, o["ship_time"].(string))
			if !at.Equal(ship) || at.Location() != time.UTC {
				t.Errorf("%s: time %v, ship's time %v", v.name, o["time"], o["ship_time"])
			}
			if s := o["time"].(string); s < last {
				t.Errorf("%s: event at %s after %s", v.name, s, last)
			} else {
				last = s
			}
		})
		walk(m["windows"], "windows", func(name string, o map[string]any) {
			if name == "windows" && !slices.IsSorted([]string{o["begin"].(string), o["best"].(string), o["end"].(string)}) {
				t.Errorf("%s: window %v: begin, best and end are out of order", v.name, o["id"])
			}
		})
	}
}

// Numbers at the edges of rounding stay in range and carry no minus zero.
func TestDecimalsAtTheEdges(t *testing.T) {
	for _, c := range []struct {
		name string
		got  json.Marshaler
		want string
	}{
		{"azimuth just under 360°", turn(unit.AngleFromDeg(359.999999)), "0.00000"},
		{"azimuth", turn(unit.AngleFromDeg(359.99998)), "359.99998"},
		{"longitude just over -180°", east(unit.AngleFromDeg(-179.9999999)), "180.00000"},
		{"longitude", east(unit.AngleFromDeg(-179.99998)), "-179.99998"},
		{"latitude just south", deg(unit.AngleFromDeg(-0.0000001)), "0.00000"},
		{"magnitude", brief(-0.001), "0.00"},
		{"time", utc(time.Date(2027, 12, 31, 23, 59, 59, 6e8, time.UTC)), `"2028-01-01T00:00:00Z"`},
		{"offset", offset(-9*time.Hour - 30*time.Minute), `"-09:30"`},
	} {
		got, err := c.got.MarshalJSON()
		if err != nil || string(got) != c.want {
			t.Errorf("%s: %s (%v), want %s", c.name, got, err, c.want)
		}
	}
}

// The magnitude of the gaps agrees with the bearings of the same triad.
func TestJSONTriadsFitTheirBodies(t *testing.T) {
	_, m := written(t, readVoyages(t)[0])
	for _, w := range m["windows"].([]any) {
		window := w.(map[string]any)
		azimuth := map[string]float64{}
		for _, b := range window["bodies"].([]any) {
			body := b.(map[string]any)
			azimuth[body["body"].(string)] = body["azimuth_deg"].(float64)
		}
		for _, x := range window["triads"].([]any) {
			triad := x.(map[string]any)
			var around []unit.Angle
			for _, name := range triad["bodies"].([]any) {
				around = append(around, unit.AngleFromDeg(azimuth[name.(string)]))
			}
			least, greatest := Gaps(around...)
			if math.Abs(least.Deg()-triad["least_gap_deg"].(float64)) > 1e-4 || math.Abs(greatest.Deg()-triad["greatest_gap_deg"].(float64)) > 1e-4 {
				t.Errorf("%v: gaps do not fit the bearings of %v", window["id"], triad["bodies"])
			}
		}
	}
}
