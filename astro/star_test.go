package astro

import (
	"fmt"
	"math"
	"strings"
	"testing"
	"time"

	"github.com/soniakeys/unit"
)

// numbered are the 57 stars by the almanac's numbers, from memory. They were
// counted by rising right ascension in the middle of the 20th century.
const numbered = `Alpheratz,Ankaa,Schedar,Diphda,Achernar,Hamal,Acamar,Menkar,Mirfak,Aldebaran,
Rigel,Capella,Bellatrix,Elnath,Alnilam,Betelgeuse,Canopus,Sirius,Adhara,Procyon,
Pollux,Avior,Suhail,Miaplacidus,Alphard,Regulus,Dubhe,Denebola,Gienah,Acrux,
Gacrux,Alioth,Spica,Alkaid,Hadar,Menkent,Arcturus,Rigil Kentaurus,Zubenelgenubi,Kochab,
Alphecca,Antares,Atria,Sabik,Shaula,Rasalhague,Eltanin,Kaus Australis,Vega,Nunki,
Altair,Peacock,Deneb,Enif,Alnair,Fomalhaut,Markab`

// In 1990 right ascension still rose in that order; Kochab and Zubenelgenubi
// changed places later in the decade. Alpheratz, the first, is just past 0 h.
func TestStarsByNumber(t *testing.T) {
	names := strings.Split(strings.ReplaceAll(numbered, "\n", ""), ",")
	if len(names) != 57 {
		t.Fatalf("%d names", len(names))
	}
	m := momentAt(t, "1990-01-01T00:00:00Z", 57)
	last := 0.0
	for i, name := range names {
		ra := circle(m.gast - m.Place(parse(t, name)).GHA.Rad()).Deg()
		if ra <= last {
			t.Errorf("number %d, %s, has right ascension %.3f°, the one before %.3f°", i+1, name, ra, last)
		}
		last = ra
	}
}

// Entries of the catalogue against outside values at J2000, from memory: places
// and magnitudes of the Bright Star Catalogue (0.1 s and 1", the last figures;
// 0.05 of a magnitude, for some vary), Polaris of Meeus ch. 21.
func TestCatalogue(t *testing.T) {
	for _, c := range []struct {
		name      string
		ra, dec   unit.Angle
		magnitude float64
	}{
		{"Sirius", hms(6, 45, 8.9), dms(-16, 42, 58), -1.46},
		{"Canopus", hms(6, 23, 57.1), dms(-52, 41, 44), -0.72},
		{"Arcturus", hms(14, 15, 39.7), dms(19, 10, 57), -0.04},
		{"Vega", hms(18, 36, 56.3), dms(38, 47, 1), 0.03},
		{"Achernar", hms(1, 37, 42.9), dms(-57, 14, 12), 0.46},
		{"Spica", hms(13, 25, 11.6), dms(-11, 9, 41), 0.98},
		{"Miaplacidus", hms(9, 13, 12.0), dms(-69, 43, 2), 1.68},
		{"Polaris", hms(2, 31, 48.704), dms(89, 15, 50.72), 2.02},
	} {
		s := catalogue()[parse(t, c.name)-firstStar]
		if apart := s.place.angle(spherical(c.ra.Rad(), c.dec.Rad())) / arcsecond; apart > 1.5 {
			t.Errorf("%s is %.2f\" off", c.name, apart)
		}
		if math.Abs(s.magnitude-c.magnitude) > 0.05 {
			t.Errorf("%s has magnitude %v, want %v", c.name, s.magnitude, c.magnitude)
		}
	}
	for _, s := range catalogue() {
		if s.parallax <= 0 || s.magnitude < -1.5 || s.magnitude > 3.3 || math.Abs(s.place.norm()-1) > 1e-12 {
			t.Errorf("%s: %+v", s.name, s)
		}
	}
}

// An apparent place from catalogue values to the end: θ Persei, Meeus, examples
// 21.b and 23.a, from memory: 2h46m14.390s, +49°21'07.45" at 2028 November 13.19
// TD (2h46m14.386s, 07.40" with SOFA). The book leaves parallax out; its older
// precession and FK5 motions are worth some 0.1".
func TestApparentStar(t *testing.T) {
	dec := dms(49, 13, 42.48)
	east := 0.03425 * 15 * 1000 * dec.Cos() // mas a year
	s := newStar([]string{"theta Persei", "", "2:44:11.986", "49:13:42.48", fmt.Sprint(east), "-89.5", "0", "0", "4.1"})
	m := atTT(t, "2028-11-13T04:33:36Z", 70)
	p := m.star(&s)
	ra := circle(m.gast - p.GHA.Rad())
	if e, n := off(ra, hms(2, 46, 14.390))*60*dec.Cos(), off(p.Dec, dms(49, 21, 7.45))*60; math.Hypot(e, n) > 0.1 {
		t.Errorf("off by %.3f\" and %.3f\"", e, n)
	}
}

// Precession over a century: mean places of Polaris, Meeus ch. 21, from memory.
// The book's IAU 1976 precession runs 0.3" a century faster in longitude, which
// moves a star at the pole by 0.12"; the frames differ by 0.02". Hence 0.2".
func TestPrecessionOfPolaris(t *testing.T) {
	for years, want := range map[float64][2]unit.Angle{
		50:  {hms(3, 48, 16.43), dms(89, 27, 15.38)},
		100: {hms(5, 53, 29.17), dms(89, 32, 22.18)},
	} {
		ra, dec := hms(2, 31, 48.704+0.19877*years), dms(89, 15, 50.72-0.0152*years)
		var mean frame
		mean.precess(years/100, 0)
		got := mean.npb.apply(spherical(ra.Rad(), dec.Rad()))
		if apart := got.angle(spherical(want[0].Rad(), want[1].Rad())) / arcsecond; apart > 0.2 {
			t.Errorf("after %v years %.3f\" off", years, apart)
		}
	}
}

// The nearest star's yearly ellipse has its parallax, 0.742" (Hipparcos), for
// half axis: by definition, to 0.02" as the months hit it and the Earth's
// distance varies.
func TestParallaxOfTheNearestStar(t *testing.T) {
	s := catalogue()[parse(t, "Rigil Kentaurus")-firstStar]
	still := s
	still.parallax = 0
	greatest := 0.0
	for month := range 12 {
		at := time.Date(2027, time.Month(1+month), 15, 0, 0, 0, 0, time.UTC)
		m := NewMoment(at, DeltaT(at))
		greatest = math.Max(greatest, m.star(&s).Separation(m.star(&still)).Sec())
	}
	if math.Abs(greatest-0.742) > 0.02 {
		t.Errorf("parallax moves it by up to %.3f\"", greatest)
	}
}
