package almanac

import (
	"bytes"
	"fmt"
	"io"
	"math"
	"strings"
	"time"

	"github.com/soniakeys/unit"

	"gloam/astro"
	"gloam/plan"
	"gloam/track/dm"
)

// text is the print so far.
type text struct{ bytes.Buffer }

func (t *text) line(format string, args ...any) {
	t.WriteString(strings.TrimRight(fmt.Sprintf(format, args...), " ") + "\n")
}

// WriteText prints rows for a person: a block for each run of one body, the
// hour first, GHA and Dec, then v and d for the hour that follows, d with the
// direction in which the declination goes.
func WriteText(w io.Writer, rows []astro.Hourly) error {
	t := &text{}
	for i, h := range rows {
		if i == 0 || !sameBlock(rows[i-1].Body, h.Body) {
			t.head(h.Body)
		}
		t.row(h)
	}
	t.line("")
	t.line("v and d are for the hour that follows. UT is taken as UTC.")
	t.caution()
	_, err := w.Write(t.Bytes())
	return err
}

// caution prints what every output says first and last.
func (t *text) caution() {
	t.line("%s Use official data to reduce sights.", plan.Cautions[0])
}

// sameBlock tells whether two bodies share a block: stars do.
func sameBlock(a, b astro.Body) bool {
	return a == b || a.Class() == astro.ClassStar && b.Class() == astro.ClassStar
}

// head prints the heads of a body's block.
func (t *text) head(b astro.Body) {
	if t.Len() > 0 {
		t.line("")
	}
	switch b.Class() {
	case astro.ClassStar:
		t.line("STARS           UTC                SHA           Dec            GHA            mag")
	case astro.ClassPoint:
		t.line("ARIES           UTC                GHA")
	default:
		t.line("%-15s UTC                GHA           Dec                 v        d      HP    SD   mag", strings.ToUpper(b.String()))
	}
}

func (t *text) row(h astro.Hourly) {
	at := h.Time.UTC().Format("2006-01-02 15:04")
	switch h.Body.Class() {
	case astro.ClassStar:
		t.line("%-15s %s  %s  %s  %s  %5.1f", h.Body, at, wide(h.SHA), dm.Lat(h.Dec), wide(h.GHA), h.Magnitude)
	case astro.ClassPoint:
		t.line("%-15s %s  %s", "", at, wide(h.GHA))
	default:
		v := ""
		if h.Body.HasV() {
			v = fmt.Sprintf("%+.1f'", h.V.Min())
		}
		t.line("%-15s %s  %s  %s  %7s  %s  %5.1f' %4.1f' %5.1f", "", at, wide(h.GHA), dm.Lat(h.Dec), v, change(h.D), h.HP.Min(), h.SD.Min(), h.Magnitude)
	}
}

// wide writes an angle in [0°, 360°) with three figures of degrees: 012° 30.0'.
// What rounds to a whole turn is nothing.
func wide(a unit.Angle) string {
	tenths := math.Mod(math.Round(a.Min()*10), 360*600)
	return strings.TrimRight(dm.Lon(unit.AngleFromMin(tenths/10)), " EW")
}

// change writes a change of declination: its size and its direction.
func change(d unit.Angle) string {
	return fmt.Sprintf("%4.1f' %c", math.Abs(d.Min()), towards(d))
}

// WriteWorked prints instants worked from hourly values, beside the place
// computed directly, to a hundredth of a minute.
func WriteWorked(w io.Writer, all []astro.Worked) error {
	t := &text{}
	for i, k := range all {
		if i > 0 {
			t.line("")
		}
		t.worked(k)
	}
	t.line("")
	t.caution()
	_, err := w.Write(t.Bytes())
	return err
}

func (t *text) worked(k astro.Worked) {
	b := k.Hour.Body
	hour := k.Hour.Time.Format("15h")
	minutes := k.Time.Sub(k.Hour.Time).Round(time.Second)
	t.line("%s at %s UTC", strings.ToUpper(b.String()), k.Time.Format("2006-01-02 15:04:05"))
	what := "GHA " + hour
	switch b.Class() {
	case astro.ClassStar:
		what = "GHA Aries " + hour
	case astro.ClassSun:
		what += " and half the missing v"
	}
	t.line("  %-30s %s", what, fine(k.Hour.GHA))
	t.line("  %-30s %s", fmt.Sprintf("increment for %02dm %02ds", int(minutes.Minutes()), int(minutes.Seconds())%60), fine(k.Increment))
	if b.HasV() {
		t.line("  %-30s %+11.2f'", fmt.Sprintf("v %+.2f'", k.Hour.V.Min()), k.VCorrection.Min())
	}
	if b.Class() == astro.ClassStar {
		t.line("  %-30s %s", "SHA", fine(k.Hour.SHA))
	}
	t.line("  %-30s %s   computed directly %s", "GHA", fine(k.GHA), fine(k.Direct.GHA))
	if b.Class() == astro.ClassPoint {
		return
	}
	if b.HasD() {
		t.line("  %-30s %s", "Dec "+hour, fineDec(k.Hour.Dec))
		t.line("  %-30s %11.2f' %c", fmt.Sprintf("d %.2f' %c", math.Abs(k.Hour.D.Min()), towards(k.Hour.D)), math.Abs(k.DCorrection.Min()), towards(k.DCorrection))
	}
	t.line("  %-30s %s computed directly %s", "Dec", fineDec(k.Dec), fineDec(k.Direct.Dec))
}

// towards is the pole to which a declination lies or goes; north where it rounds
// to nothing.
func towards(dec unit.Angle) rune {
	if dec.Min() <= -0.005 {
		return 'S'
	}
	return 'N'
}

// fine writes an angle in [0°, 360°) to a hundredth of a minute, rounded once.
func fine(a unit.Angle) string {
	hundredths := int(math.Round(a.Min()*100)) % (360 * 6000)
	return fmt.Sprintf("%03d° %02d.%02d'", hundredths/6000, hundredths%6000/100, hundredths%100)
}

// fineDec writes a declination so.
func fineDec(a unit.Angle) string {
	return fmt.Sprintf("%s %c", fine(unit.Angle(math.Abs(a.Rad()))), towards(a))
}
