package plan

import (
	"fmt"
	"strings"
	"time"
)

// Words gives the kind in words: "evening stars".
func (k WindowKind) Words() string { return strings.ReplaceAll(string(k), "-", " ") }

// Words gives the kind in words: "civil dusk".
func (k EventKind) Words() string { return strings.ReplaceAll(string(k), "-", " ") }

// ZoneText writes the offset of ship's time both ways the trade does: what is
// added to UTC to get ship's time, and the zone description, added to ship's
// time to get UTC: "UTC-2 (ZD +2)", "UTC+5:30 (ZD -5:30)".
func ZoneText(offset time.Duration) string {
	if offset == 0 {
		return "UTC (ZD 0)"
	}
	return fmt.Sprintf("UTC%s (ZD %s)", signedHours(offset), signedHours(-offset))
}

func signedHours(d time.Duration) string {
	sign := '+'
	if d < 0 {
		sign, d = '-', -d
	}
	if minutes := d % time.Hour / time.Minute; minutes > 0 {
		return fmt.Sprintf("%c%d:%02d", sign, d/time.Hour, minutes)
	}
	return fmt.Sprintf("%c%d", sign, d/time.Hour)
}

// Words tells how much of the Moon is lit and whether it grows: "84 % lit,
// waxing".
func (m MoonPhase) Words() string {
	percent := int(100*m.Illuminated + 0.5)
	switch {
	case percent == 0:
		return "new"
	case percent == 100:
		return "full"
	case m.Waxing:
		return fmt.Sprintf("%d %% lit, waxing", percent)
	}
	return fmt.Sprintf("%d %% lit, waning", percent)
}

// Comment says what a window lacks, in words: nothing to shoot, or too few
// bodies or too little time for a checked fix. Else it is empty.
func (w *Window) Comment() string {
	switch len(w.Bodies) {
	case 0:
		return "nothing to shoot: too low, too high, hidden, too faint or without horizon"
	case 1:
		return "one body only: a line of position, no fix"
	case 2:
		return "two bodies only: no check on the fix"
	}
	if n := len(w.Round); n > 0 && n < 3 {
		return fmt.Sprintf("time for %d only at this pace: no check on the fix", n)
	}
	return ""
}
