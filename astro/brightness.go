package astro

import (
	"math"
	"time"

	"github.com/soniakeys/unit"
)

// Air is what the brightness of the sky and the dimming of a body depend on
// beside the bodies: Schaefer's model ("To the Visual Limits", Sky & Telescope,
// May 1998, p. 57; visual band, at sea level). Make one with [NewAir].
type Air struct {
	gas, aerosol, ozone, water float64 // extinction, magnitudes per air mass
	sum                        float64 // of these
	night                      float64 // the night sky's own light, by the solar cycle
}

// Constants of the model for the visual band.
const (
	visualZero   = -11.05 // MO
	visualSun    = -26.74 // MS
	visualNight  = 1.0e-13
	ozoneDepth   = 0.031
	waterDepth   = 0.031
	nanolambert  = 1.11e-15
	rayleigh     = 0.1066
	farAirMass   = 40 // of a light below the horizon
	fullScatter  = 440000
	dayMagnitude = 43.27
)

// NewAir gives the air at a temperature in degrees Celsius, a relative humidity
// (0 to 1, both excluded) and a latitude, in the season and the year of an
// instant.
func NewAir(temperatureC, humidity float64, lat unit.Angle, t time.Time) Air {
	season := float64(t.Month()-3) * 30 * degree
	sign := math.Copysign(1, lat.Rad())
	year := float64(t.Year()) + float64(t.YearDay()-1)/365.25
	a := Air{
		gas:     rayleigh,
		aerosol: 0.1 * math.Pow(1-0.32/math.Log(humidity), 1.33) * (1 + 0.33*sign*sin(season)),
		ozone:   ozoneDepth * (3 + 0.4*(lat.Rad()*cos(season)-cos(3*lat.Rad()))) / 3,
		water:   waterDepth * 0.94 * humidity * math.Exp(temperatureC/15),
		night:   visualNight * (1 + 0.3*cos(2*math.Pi*(year-1992)/11)),
	}
	a.sum = a.gas + a.aerosol + a.ozone + a.water
	return a
}

// Extinction is how many magnitudes a body at an altitude of 0° to 90° is
// dimmed.
func (a Air) Extinction(h unit.Angle) float64 {
	c := math.Max(h.Sin(), 0)
	gas := 1 / (c + 0.0286*math.Exp(-10.5*c))
	aerosol := 1 / (c + 0.0123*math.Exp(-24.5*c))
	ozone := 1 / math.Sqrt(1-(1-c*c)/math.Pow(1+20.0/6378, 2))
	return (a.gas+a.water)*gas + a.aerosol*aerosol + a.ozone*ozone
}

// airMass is that of the sky's own light.
func airMass(h unit.Angle) float64 {
	if h < 0 {
		return farAirMass
	}
	c := h.Sin()
	return 1 / (c + 0.025*math.Exp(-11*c))
}

// Light is a body that lights the sky: where it stands and, for the Moon, its
// phase angle.
type Light struct {
	Altitude, Azimuth unit.Angle
	Phase             unit.Angle // 0° at full Moon
}

// distance is the angle between the light and a direction, at least 0.25°, in
// degrees.
func (l Light) distance(h, zn unit.Angle) float64 {
	sinL, cosL := l.Altitude.Sincos()
	sinH, cosH := h.Sincos()
	return math.Max(math.Acos(math.Min(sinL*sinH+cosL*cosH*(l.Azimuth-zn).Cos(), 1))/degree, 0.25)
}

// scatter is how strongly air throws light sideways at a distance in degrees
// (Krisciunas & Schaefer, PASP 103, 1033, 1991).
func scatter(distance float64) float64 {
	c := cos(distance * degree)
	return 6.2e7/(distance*distance) + tenTo(6.15-distance/40) + 229086.77*(1.06+c*c) // 10^5.36
}

// Brightness is that of the sky in a direction, in nanolamberts: night sky,
// twilight or daylight, whichever is less, and moonlight.
func (a Air) Brightness(sun, moon Light, h, zn unit.Angle) float64 {
	k, x := a.sum, airMass(h)
	dimmed := 1 - dim(k*x)
	sine := 1 - h.Sin()*h.Sin() // sin² of the zenith distance
	night := a.night * (0.4 + 0.6/math.Sqrt(1-0.96*sine)) * dim(k*x)

	rs, zenith := sun.distance(h, zn), 90-h.Deg()
	twilight := dim(visualSun-visualZero+32.5-sun.Altitude.Deg()-zenith/(360*k)) * (100 / rs) * dimmed
	return (night + math.Min(twilight, scattered(visualSun, k, rs, airMass(sun.Altitude), dimmed)) + a.moonlight(moon, k, dimmed, h, zn)) / nanolambert
}

// scattered is the light that the air scatters from a body of a magnitude.
func scattered(magnitude, k, distance, mass, dimmed float64) float64 {
	through := dim(k * mass)
	return dim(magnitude-visualZero+dayMagnitude) * dimmed * (scatter(distance)*through + fullScatter*(1-through))
}

func (a Air) moonlight(moon Light, k, dimmed float64, h, zn unit.Angle) float64 {
	if moon.Altitude <= 0 {
		return 0
	}
	magnitude := moonMagnitude(math.Abs(moon.Phase.Deg()), meanMoonKm)
	return scattered(magnitude, k, moon.distance(h, zn), airMass(moon.Altitude), dimmed)
}

// LimitingMagnitude is that of the faintest body the naked eye finds at an
// altitude against a sky of a brightness in nanolamberts (Schaefer, as above).
func (a Air) LimitingMagnitude(brightness float64, h unit.Angle) float64 {
	c1, c2 := -9.8, -1.9 // logarithms
	if brightness > 1500 {
		c1, c2 = -8.350001, -5.9
	}
	threshold := c1 + 2*math.Log10(1+math.Sqrt(tenTo(c2)*brightness))
	return -16.57 - 2.5*threshold - a.Extinction(h)
}

// tenTo is 10 to a power.
func tenTo(x float64) float64 { return math.Exp(math.Ln10 * x) }

// dim is the factor by which magnitudes weaken light.
func dim(magnitudes float64) float64 { return tenTo(-0.4 * magnitudes) }
