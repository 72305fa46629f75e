package main

import (
	"fmt"
	"math"
	"strconv"
	"time"

	"github.com/spf13/cobra"

	"gloam/astro"
)

// deltaTFlag is the flag --delta-t: ΔT = TT - UT1 in seconds, or nothing for
// the built-in table and forecast.
type deltaTFlag struct{ given *float64 }

func (d *deltaTFlag) define(cmd *cobra.Command) {
	cmd.Flags().Var(d, "delta-t", "ΔT = TT - UT1 in seconds (default: table, and forecast from 2026)")
}

// at gives ΔT at an instant.
func (d *deltaTFlag) at(t time.Time) time.Duration {
	if d.given == nil {
		return astro.DeltaT(t)
	}
	return time.Duration(*d.given * float64(time.Second))
}

// Set, String and Type make it a flag's value.
func (d *deltaTFlag) Set(text string) error {
	x, err := strconv.ParseFloat(text, 64)
	if err != nil || math.IsNaN(x) || math.Abs(x) > 1000 {
		return fmt.Errorf("seconds, -1000 to 1000")
	}
	d.given = &x
	return nil
}

func (d *deltaTFlag) String() string {
	if d.given == nil {
		return ""
	}
	return fmt.Sprint(*d.given)
}

func (d *deltaTFlag) Type() string { return "seconds" }
