package astro

import (
	"math"
	"time"
)

// j2000 is 2000 January 1, 12h.
var j2000 = time.Date(2000, 1, 1, 12, 0, 0, 0, time.UTC)

// daysSinceJ2000 counts days of 86400 s from J2000 in the scale of t.
func daysSinceJ2000(t time.Time) float64 {
	return float64(t.Unix()-j2000.Unix())/86400 + float64(t.Nanosecond())/86400e9
}

// deltaTTable is TT-UT1 in seconds on 1 January of each year from 1990. To
// 2023 rounded from the historic table of the US Naval Observatory and IERS
// (as carried in data/deltat.txt of the npm package astronomia 4.2.0); from
// 2024 IERS Bulletin A, from memory, to 0.1 s.
var deltaTTable = [...]float64{
	56.86, 57.57, 58.31, 59.12, 59.98, 60.79, 61.63, 62.30, 62.97, 63.47, // 1990
	63.83, 64.09, 64.30, 64.47, 64.57, 64.69, 64.85, 65.15, 65.46, 65.78, // 2000
	66.07, 66.32, 66.60, 66.91, 67.28, 67.64, 68.10, 68.59, 68.97, 69.22, // 2010
	69.36, 69.36, 69.29, 69.17, 69.2, 69.1, 69.1, // 2020
}

const deltaTFirstYear = 1990

// tidal is half the long-term acceleration of ΔT, in seconds per century
// squared (Stephenson, Morrison & Hohenkerk, Proc. R. Soc. A 472, 20160404,
// 2016: the length of the day grows by 1.78 ms a century).
const tidal = 32.5

// DeltaT gives ΔT = TT - UT1: a table of yearly values from 1990 to 2026
// between which it interpolates, then an extrapolation that goes on from the
// mean rate of the table's last ten years with the long-term acceleration.
// Before 1990 it gives the value of 1990. Accurate to 0.1 s to 2025; nobody
// can tell the value of 2100 to better than some 30 s.
func DeltaT(t time.Time) time.Duration {
	year := 2000 + daysSinceJ2000(t)/365.25
	x := math.Max(year-deltaTFirstYear, 0)
	last := len(deltaTTable) - 1
	seconds := 0.0
	if i := int(x); i < last {
		seconds = deltaTTable[i] + (x-float64(i))*(deltaTTable[i+1]-deltaTTable[i])
	} else {
		ahead := x - float64(last)
		rate := (deltaTTable[last] - deltaTTable[last-10]) / 10
		seconds = deltaTTable[last] + rate*ahead + tidal*(ahead/100)*(ahead/100)
	}
	return time.Duration(seconds * float64(time.Second))
}
