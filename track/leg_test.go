package track

import (
	"encoding/csv"
	"math"
	"os"
	"strconv"
	"testing"

	"github.com/soniakeys/unit"
)

// sailing is a row of testdata/sailings.csv (see testdata/README.md).
type sailing struct {
	from, to                                             Position
	rhumbCourse, rhumbNM, gcInitial, gcFinal, geodesicNM float64
}

func readSailings(t *testing.T) []sailing {
	t.Helper()
	f, err := os.Open("testdata/sailings.csv")
	if err != nil {
		t.Fatal(err)
	}
	defer f.Close()
	rows, err := csv.NewReader(f).ReadAll()
	if err != nil {
		t.Fatal(err)
	}
	var all []sailing
	for _, row := range rows[1:] {
		v := make([]float64, len(row))
		for i := range row {
			if v[i], err = strconv.ParseFloat(row[i], 64); err != nil {
				t.Fatal(err)
			}
		}
		all = append(all, sailing{PositionFromDeg(v[0], v[1]), PositionFromDeg(v[2], v[3]), v[4], v[5], v[6], v[7], v[8]})
	}
	return all
}

// courseTolerance is 0.0005°: the source prints courses to 1e-6°, the rest is
// room for nearly meridional courses between points given to 1e-4°.
const courseTolerance = 0.0005

// distanceTolerance is 0.01 NM, or a millionth of a long distance.
func distanceTolerance(nm float64) float64 { return math.Max(0.01, nm*1e-6) }

// Source: GeographicLib RhumbSolve and GeodSolve, 120 pairs of points.
func TestSailingsAgainstGeographicLib(t *testing.T) {
	rows := readSailings(t)
	if len(rows) < 100 {
		t.Fatalf("%d rows, want 100 or more", len(rows))
	}
	var worstNM, worstDeg float64
	check := func(row int, what string, gotNM, wantNM float64, courses ...[2]float64) {
		worstNM = math.Max(worstNM, math.Abs(gotNM-wantNM))
		if math.Abs(gotNM-wantNM) > distanceTolerance(wantNM) {
			t.Errorf("row %d %s: %.5f NM, want %.5f", row, what, gotNM, wantNM)
		}
		for _, c := range courses {
			off := math.Abs(wrapDeg(c[0] - c[1]))
			worstDeg = math.Max(worstDeg, off)
			if off > courseTolerance {
				t.Errorf("row %d %s: course %.6f, want %.6f", row, what, c[0], c[1])
			}
		}
	}
	for i, s := range rows {
		r := NewLeg(Waypoint{Position: s.from}, Waypoint{Position: s.to}, Rhumb)
		check(i+2, "rhumb", r.DistanceNM, s.rhumbNM, [2]float64{r.Course.Deg(), s.rhumbCourse})
		g := NewLeg(Waypoint{Position: s.from}, Waypoint{Position: s.to}, GreatCircle)
		_, final := g.At(g.DistanceNM)
		check(i+2, "great circle", g.DistanceNM, s.geodesicNM,
			[2]float64{g.Course.Deg(), s.gcInitial}, [2]float64{final.Deg(), s.gcFinal})
	}
	t.Logf("%d pairs: worst distance %.6f NM, worst course %.7f°", len(rows), worstNM, worstDeg)
}

// A leg ends where it should, by either sailing: the direct problem closes the
// inverse to 1e-4' (0.2 m), the size of rounding in the place of the far end.
func TestLegEndsAtItsWaypoint(t *testing.T) {
	for i, s := range readSailings(t) {
		for _, how := range []Sailing{Rhumb, GreatCircle} {
			leg := NewLeg(Waypoint{Position: s.from}, Waypoint{Position: s.to}, how)
			end, _ := leg.At(leg.DistanceNM)
			if d := NewLeg(Waypoint{Position: end}, Waypoint{Position: s.to}, GreatCircle).DistanceNM; d > 1e-4 {
				t.Errorf("row %d %v: ends %.6f NM from its waypoint", i+2, how, d)
			}
			if end.Lon <= -math.Pi || end.Lon > math.Pi || leg.Course < 0 || leg.Course >= 2*math.Pi {
				t.Errorf("row %d %v: longitude %v or course %v out of range", i+2, how, end.Lon.Deg(), leg.Course.Deg())
			}
		}
	}
}

// Meridional parts on WGS84, in minutes of the equator. Source: formula
// M = a'(atanh sin L - e atanh(e sin L)), evaluated outside this project
// (calc, a regression value); printed tables use other spheroids.
func TestMeridionalParts(t *testing.T) {
	for lat, want := range map[float64]float64{6: 358.25, 30: 1876.86, 45: 3013.65, 60: 4507.40, 68: 5609.44} {
		got := unit.Angle(isometric(unit.AngleFromDeg(lat).Rad())).Min()
		if math.Abs(got-want) > 0.006 { // half of the last figure given
			t.Errorf("meridional parts of %v°: %.3f, want %.2f", lat, got, want)
		}
	}
}
