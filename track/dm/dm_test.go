package dm

import (
	"math"
	"testing"

	"github.com/soniakeys/unit"
)

// angle is d degrees and m minutes, the sign that of both.
func angle(d, m float64) unit.Angle { return unit.AngleFromDeg(d + m/60) }

// The way of writing is common practice, no published source: two figures of
// degrees for latitude, three for longitude and bearings, tenths of a minute,
// the hemisphere after the figures.
var written = []struct {
	got, want string
}{
	{Lat(angle(49, 12.4)), "49° 12.4' N"},
	{Lat(angle(-49, -12.4)), "49° 12.4' S"},
	{Lat(angle(5, 3)), "05° 03.0' N"},
	{Lat(0), "00° 00.0' N"},
	{Lat(angle(90, 0)), "90° 00.0' N"},
	{Lat(angle(-90, 0)), "90° 00.0' S"},
	{Lon(angle(12, 30)), "012° 30.0' E"},
	{Lon(angle(-12, -30)), "012° 30.0' W"},
	{Lon(angle(0, -30)), "000° 30.0' W"},
	{Lon(angle(180, 0)), "180° 00.0' E"},
	{Lon(angle(179, 59.9)), "179° 59.9' E"},
	{Position(angle(49, 12.4), angle(-12, -30)), "49° 12.4' N 012° 30.0' W"},
	{Position(angle(-1, -2), angle(103, 50.06)), "01° 02.0' S 103° 50.1' E"},
	{Altitude(angle(41, 7.3)), "41° 07.3'"},
	{Altitude(angle(0, -34)), "-00° 34.0'"},
	{Altitude(angle(-12, 0)), "-12° 00.0'"},
	{Altitude(angle(105, 1)), "105° 01.0'"},

	// Carries.
	{Lat(angle(48, 59.94)), "48° 59.9' N"},
	{Lat(angle(48, 59.96)), "49° 00.0' N"},
	{Lat(angle(-48, -59.96)), "49° 00.0' S"},
	{Lon(angle(9, 59.96)), "010° 00.0' E"},
	{Lon(angle(-99, -59.96)), "100° 00.0' W"},
	{Lon(angle(179, 59.96)), "180° 00.0' E"},
	{Altitude(angle(9, 59.96)), "10° 00.0'"},
	{Altitude(angle(-9, -59.96)), "-10° 00.0'"},
	{Altitude(angle(12, 9.96)), "12° 10.0'"},

	// What rounds to zero has no sign and is north, east.
	{Lat(angle(0, -0.04)), "00° 00.0' N"},
	{Lat(angle(0, -0.06)), "00° 00.1' S"},
	{Lon(angle(0, -0.04)), "000° 00.0' E"},
	{Lon(angle(0, -0.06)), "000° 00.1' W"},
	{Altitude(angle(0, -0.04)), "00° 00.0'"},
	{Altitude(angle(0, -0.06)), "-00° 00.1'"},
	{Lat(unit.Angle(math.Copysign(0, -1))), "00° 00.0' N"},
	{Altitude(unit.Angle(math.Copysign(0, -1))), "00° 00.0'"},

	// Directions.
	{Bearing(angle(63, 0)), "063°"},
	{Bearing(0), "000°"},
	{Bearing(angle(5.4, 0)), "005°"},
	{Bearing(angle(359.4, 0)), "359°"},
	{Bearing(angle(359.6, 0)), "000°"},
	{Bearing(angle(360, 0)), "000°"},
	{Bearing(angle(-0.4, 0)), "000°"},
	{Bearing(angle(-90, 0)), "270°"},
	{Bearing(-1e-17), "000°"},
	{Course(angle(63.4, 0)), "063.4°"},
	{Course(angle(5.06, 0)), "005.1°"},
	{Course(0), "000.0°"},
	{Course(angle(9.96, 0)), "010.0°"},
	{Course(angle(359.94, 0)), "359.9°"},
	{Course(angle(359.96, 0)), "000.0°"},
	{Course(angle(360, 0)), "000.0°"},
	{Course(angle(-0.04, 0)), "000.0°"},
	{Course(angle(-0.1, 0)), "359.9°"},
	{Course(-1e-17), "000.0°"},
}

func TestWritten(t *testing.T) {
	for i, c := range written {
		if c.got != c.want {
			t.Errorf("row %d: %q, want %q", i, c.got, c.want)
		}
	}
}

// Every hundredth of a minute over two degrees, both signs: the width never
// changes, minutes stay below 60.0', and what is written lies within 0.05'.
func TestEveryHundredth(t *testing.T) {
	for n := -12000; n <= 12000; n++ {
		a := angle(0, float64(n)/100)
		s := Lon(a)
		deg := 100*float64(s[0]-'0') + 10*float64(s[1]-'0') + float64(s[2]-'0')
		r := []rune(s)
		min := 10*float64(r[5]-'0') + float64(r[6]-'0') + float64(r[8]-'0')/10
		back := deg*60 + min
		if r[len(r)-1] == 'W' {
			back = -back
		}
		if len(r) != len([]rune("000° 00.0' E")) || min >= 60 || math.Abs(back-a.Min()) > 0.05+1e-9 { // 1e-9' is rounding in the angle
			t.Fatalf("%v': %q", float64(n)/100, s)
		}
	}
}
