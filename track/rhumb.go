package track

import (
	"math"

	"github.com/soniakeys/unit"
)

// WGS84, and the international nautical mile.
const (
	equatorM   = 6378137.0
	flattening = 1 / 298.257223563
	mileM      = 1852.0
	ecc2       = flattening * (2 - flattening)
	third      = flattening / (2 - flattening) // third flattening n
)

var eccentricity = math.Sqrt(ecc2)

// rectifyingNM is the radius, in nautical miles, of the sphere whose meridians
// are as long as the ellipsoid's. Series in n (Karney, "Transverse Mercator
// with an accuracy of a few nanometers", 2011, eq. 14).
var rectifyingNM = equatorM / mileM / (1 + third) *
	(1 + third*third/4 + math.Pow(third, 4)/64 + math.Pow(third, 6)/256)

// toRectifying and fromRectifying are the coefficients of sin 2kφ (k = 1...)
// that turn geodetic into rectifying latitude and back (Deakin & Hunter,
// "Geometric geodesy", 2010; the same numbers stand in Karney, "On auxiliary
// latitudes", 2023, tables for μ-φ and φ-μ), to order n⁴: the next term is
// below 1e-15.
var (
	n2, n3, n4   = third * third, third * third * third, third * third * third * third
	toRectifying = [...]float64{
		-3*third/2 + 9*n3/16,
		15*n2/16 - 15*n4/32,
		-35 * n3 / 48,
		315 * n4 / 512,
	}
	fromRectifying = [...]float64{
		3*third/2 - 27*n3/32,
		21*n2/16 - 55*n4/32,
		151 * n3 / 96,
		1097 * n4 / 512,
	}
)

// sineSeries sums c[k-1] sin 2kx by Clenshaw's rule.
func sineSeries(c []float64, x float64) float64 {
	sin, cos := math.Sincos(2 * x)
	var u, before float64
	for k := len(c) - 1; k >= 0; k-- {
		u, before = c[k]+2*cos*u-before, u
	}
	return u * sin
}

// meridianArc is the distance in nautical miles along the meridian from the
// equator to a latitude.
func meridianArc(lat float64) float64 {
	return rectifyingNM * (lat + sineSeries(toRectifying[:], lat))
}

// arcLatitude is the inverse of meridianArc, in radians.
func arcLatitude(nm float64) float64 {
	mu := nm / rectifyingNM
	return mu + sineSeries(fromRectifying[:], mu)
}

// isometric is the isometric latitude ψ of a latitude, in radians: the
// meridional parts on the ellipsoid.
func isometric(lat float64) float64 {
	s := math.Sin(lat)
	return math.Atanh(s) - eccentricity*math.Atanh(eccentricity*s)
}

// departureRate is the mean of dψ/dm between two latitudes, the change of
// longitude in radians per nautical mile of easting. Nearly east-west courses
// take the mean of the derivative by Simpson's rule, which for a difference of
// 64 m errs by less than 1 in 1e10 below 89.9°.
func departureRate(lat1, lat2 float64) float64 {
	if math.Abs(lat2-lat1) > 1e-5 {
		return (isometric(lat2) - isometric(lat1)) / (meridianArc(lat2) - meridianArc(lat1))
	}
	return (parallelRate(lat1) + 4*parallelRate((lat1+lat2)/2) + parallelRate(lat2)) / 6
}

// parallelRate is dψ/dm at a latitude, 1/(N cos φ).
func parallelRate(lat float64) float64 {
	s, c := math.Sincos(lat)
	return math.Sqrt(1-ecc2*s*s) / (equatorM / mileM * c)
}

// rhumb finds course and distance (NM) of the rhumb line between two places,
// the shorter way round. Neither may be a pole.
func rhumb(from, to Position) (course unit.Angle, nm float64) {
	dLon := wrap(to.Lon - from.Lon).Rad()
	north := meridianArc(to.Lat.Rad()) - meridianArc(from.Lat.Rad())
	east := dLon / departureRate(from.Lat.Rad(), to.Lat.Rad())
	return turn(unit.Angle(math.Atan2(east, north))), math.Hypot(north, east)
}

// rhumbDirect finds the place nm miles along a rhumb line.
func rhumbDirect(from Position, course unit.Angle, nm float64) Position {
	s, c := course.Sincos()
	lat := arcLatitude(meridianArc(from.Lat.Rad()) + nm*c)
	dLon := nm * s * departureRate(from.Lat.Rad(), lat)
	return Position{unit.Angle(lat), wrap(from.Lon + unit.Angle(dLon))}
}
