package sheet

import "math"

// box is the room of a label or a mark.
type box struct{ x, y, width, height float64 }

func (b box) meets(c box) bool {
	return b.x < c.x+c.width && c.x < b.x+b.width && b.y < c.y+c.height && c.y < b.y+b.height
}

// farthest is how far the farthest corner lies from a place.
func (b box) farthest(x, y float64) float64 {
	dx := math.Max(math.Abs(b.x-x), math.Abs(b.x+b.width-x))
	dy := math.Max(math.Abs(b.y-y), math.Abs(b.y+b.height-y))
	return math.Hypot(dx, dy)
}

// labels places texts beside marks so that they meet neither each other, nor a
// mark, nor the edge of a disc.
type labels struct {
	cx, cy, r float64 // of the disc
	taken     []box
}

// Sizes of the letters of a label, counted generously: no font is known here.
const (
	letterWidth  = 6.5
	boldWidth    = 7.3
	letterHeight = 12
)

func (l *labels) mark(x, y, r float64) {
	l.taken = append(l.taken, box{x - r, y - r, 2 * r, 2 * r})
}

// place finds room for a text of a width near a mark of a radius: in sixteen directions,
// then farther off. ok is false where there is none.
func (l *labels) place(x, y, r, width float64) (b box, ok bool) {
	for _, gap := range []float64{2, 7, 13, 20, 28, 38, 50} {
		for k := range 16 {
			sin, cos := math.Sincos(float64(k) * math.Pi / 8)
			b := box{x + (r+gap)*sin, y - (r+gap)*cos - letterHeight/2, width, letterHeight}
			switch {
			case k > 8 && k < 16:
				b.x -= width
			case k == 0 || k == 8:
				b.x -= width / 2
			}
			switch k {
			case 0:
				b.y -= letterHeight / 2
			case 8:
				b.y += letterHeight / 2
			}
			if l.free(b) {
				l.taken = append(l.taken, b)
				return b, true
			}
		}
	}
	return box{}, false
}

func (l *labels) free(b box) bool {
	if b.farthest(l.cx, l.cy) > l.r-1 {
		return false
	}
	for _, t := range l.taken {
		if b.meets(t) {
			return false
		}
	}
	return true
}
