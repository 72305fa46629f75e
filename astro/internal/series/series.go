// Package series sums the trigonometric series of planetary and lunar
// theories, and packs them for embedding.
package series

import (
	"encoding/binary"
	"math"
)

// Term is A cos(B + C t).
type Term struct{ A, B, C float64 }

// Series is the terms of each power of t: Σ tᵏ Σ A cos(B + C t).
type Series [][]Term

// Sum evaluates the series at t.
func (s Series) Sum(t float64) (sum float64) {
	for k := len(s) - 1; k >= 0; k-- {
		a := 0.0
		for _, x := range s[k] {
			a += x.A * math.Cos(x.B+x.C*t)
		}
		sum = sum*t + a
	}
	return sum
}

// SumRate evaluates the series and its derivative by t.
func (s Series) SumRate(t float64) (sum, rate float64) {
	for k := len(s) - 1; k >= 0; k-- {
		var a, da float64
		for _, x := range s[k] {
			sin, cos := math.Sincos(x.B + x.C*t)
			a += x.A * cos
			da -= x.A * x.C * sin
		}
		rate = sum + rate*t + da
		sum = sum*t + a
	}
	return sum, rate
}

// Len counts the terms.
func (s Series) Len() (n int) {
	for _, power := range s {
		n += len(power)
	}
	return n
}

// Cut keeps the terms whose amplitude reaches the limit somewhere in |t| up to
// reach.
func (s Series) Cut(limit, reach float64) Series {
	kept := make(Series, len(s))
	for k, power := range s {
		for _, x := range power {
			if math.Abs(x.A)*math.Pow(reach, float64(k)) >= limit {
				kept[k] = append(kept[k], x)
			}
		}
	}
	return kept
}

// Packed is a table in the form embedded: counts as uint16 and numbers as
// float64, little endian. A series is the count of its powers, and for each
// the count of its terms and the terms.
type Packed []byte

// PutFloats adds numbers.
func (p *Packed) PutFloats(all ...float64) {
	for _, x := range all {
		*p = binary.LittleEndian.AppendUint64(*p, math.Float64bits(x))
	}
}

// PutCount adds a count, at most 65535.
func (p *Packed) PutCount(n int) { *p = binary.LittleEndian.AppendUint16(*p, uint16(n)) }

// PutSeries adds a series.
func (p *Packed) PutSeries(s Series) {
	p.PutCount(len(s))
	for _, power := range s {
		p.PutCount(len(power))
		for _, x := range power {
			p.PutFloats(x.A, x.B, x.C)
		}
	}
}

// Floats takes the next numbers, as many as there is room for.
func (p *Packed) Floats(into []float64) {
	for i := range into {
		into[i] = math.Float64frombits(binary.LittleEndian.Uint64(*p))
		*p = (*p)[8:]
	}
}

// Count takes the next count.
func (p *Packed) Count() int {
	n := binary.LittleEndian.Uint16(*p)
	*p = (*p)[2:]
	return int(n)
}

// Series takes the next series.
func (p *Packed) Series() Series {
	s := make(Series, p.Count())
	for k := range s {
		s[k] = make([]Term, p.Count())
		for i := range s[k] {
			var x [3]float64
			p.Floats(x[:])
			s[k][i] = Term{x[0], x[1], x[2]}
		}
	}
	return s
}
