package plan

import (
	"math"

	"github.com/soniakeys/unit"

	"gloam/astro"
)

// Triad is three candidates and the fix they give.
type Triad struct {
	Bodies                [3]astro.Body // in order of azimuth
	LeastGap, GreatestGap unit.Angle    // between neighbours round the horizon; 120° is ideal
	Covariance            Covariance
}

// triadsListed is how many triads a window lists.
const triadsListed = 5

// triads searches all triads of the candidates and gives the best few, in
// order of expected error.
func triads(bodies []Candidate, common unit.Angle) []Triad {
	parts := make([]information, len(bodies))
	for i, c := range bodies {
		parts[i] = Sight{c.Azimuth, c.Error}.information()
	}
	var best ranking
	for i := range parts {
		for j := i + 1; j < len(parts); j++ {
			pair := parts[i].add(parts[j])
			for k := j + 1; k < len(parts); k++ {
				cov := pair.add(parts[k]).covariance(common.Min())
				best.offer(ranked{cov.NN + cov.EE, cov, [3]int{i, j, k}})
			}
		}
	}
	var all []Triad
	for _, r := range best {
		a, b, c := &bodies[r.index[0]], &bodies[r.index[1]], &bodies[r.index[2]]
		t := Triad{Bodies: [3]astro.Body{a.Body, b.Body, c.Body}, Covariance: r.covariance}
		t.LeastGap, t.GreatestGap = Gaps(a.Azimuth, b.Azimuth, c.Azimuth)
		all = append(all, t)
	}
	return all
}

// ranked is a triad found, with the square of its expected error.
type ranked struct {
	square     float64
	covariance Covariance
	index      [3]int
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
