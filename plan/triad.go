package plan

import (
	"math"

	"gloam/astro"
)

// Triad is three candidates, in order of azimuth, and the fix they give. Gaps of
// 120° are ideal.
type Triad struct{ FixQuality }

// triadsListed is how many triads a window lists.
const triadsListed = 5

// triads searches all triads of the candidates and gives the best few, in
// order of expected error.
func (set *Settings) triads(bodies []Candidate) []Triad {
	parts := informations(bodies)
	weight := commonWeight(set.CommonError)
	var best ranking
	for i := range parts {
		for j := i + 1; j < len(parts); j++ {
			pair := parts[i].add(parts[j])
			for k := j + 1; k < len(parts); k++ {
				three := pair.add(parts[k])
				best.offer(ranked{three.square(weight), [3]int{i, j, k}})
			}
		}
	}
	var all []Triad
	for _, r := range best {
		var names []astro.Body
		var sights []Sight
		for _, i := range r.index {
			names, sights = append(names, bodies[i].Body), append(sights, Sight{bodies[i].Azimuth, bodies[i].Error})
		}
		all = append(all, Triad{set.quality(names, sights)})
	}
	return all
}

// informations are what each candidate would tell.
func informations(bodies []Candidate) []information {
	parts := make([]information, len(bodies))
	for i, c := range bodies {
		parts[i] = Sight{c.Azimuth, c.Error}.information()
	}
	return parts
}

// ranked is a triad found, with the square of its expected error.
type ranked struct {
	square float64
	index  [3]int
}

// ranking keeps the best few offered, the best first; of equals the earlier.
type ranking []ranked

func (r *ranking) offer(x ranked) {
	if math.IsInf(x.square, 1) || (len(*r) == triadsListed && x.square >= (*r)[triadsListed-1].square) {
		return
	}
	if len(*r) < triadsListed {
		*r = append(*r, x)
	}
	i := len(*r) - 1
	for ; i > 0 && x.square < (*r)[i-1].square; i-- {
		(*r)[i] = (*r)[i-1]
	}
	(*r)[i] = x
}
