package astro

import (
	"math"

	"gloam/astro/internal/elp"
)

// moonRadius is the Moon's as a part of the Earth's, by which SD follows from
// HP.
const moonRadius = 0.2724

// moon gives the Moon's place where it was when the light left it, light time
// found from the distance now. The theory is geocentric, so there is no annual
// aberration to add.
func (f *frame) moon() Place {
	lightTime := elp.Distance(f.tt/36525) / kmPerAU * lightDayPerAU
	geocentric := fromEcliptic.apply(vector(elp.Place((f.tt - lightTime) / 36525)))
	km := geocentric.norm()
	p := f.place(f.npb.apply(geocentric))
	p.HP = parallax(km / kmPerAU)
	p.SD = p.HP.Mul(moonRadius)
	return p
}

// litBy fills in how the Moon looks under the Sun: the phase angle follows from
// the elongation and the two distances.
func (p Place) litBy(sun Place) Place {
	moonAU, sunAU := equatorAU/p.HP.Sin(), equatorAU/sun.HP.Sin()
	s, c := p.Separation(sun).Sincos()
	phase := math.Atan2(sunAU*s, moonAU-sunAU*c)
	p.Illuminated = (1 + cos(phase)) / 2
	p.Magnitude = moonMagnitude(phase/degree, moonAU*kmPerAU)
	return p
}
