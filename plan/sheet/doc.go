// Package sheet writes a plan as one HTML page to print and to read on a phone
// in the dark: no script, no request, every picture inline SVG.
//
// East and west in the sky discs stand as on a chart, east to the right, so that
// bearings run clockwise as on the compass; [Options] turns them over.
package sheet

//go:generate go run ./gen
