// Package plan joins the ship's track and the sky: it finds the twilights and
// the other events as they are seen from the moving ship, the windows in which
// star sights can be taken, the bodies worth taking in each, and the triads
// that make the best-shaped fix.
//
// [New] makes a [Plan] from a [track.Passage]. [Plan.WriteText] and
// [Plan.WriteJSON] print it. Nothing here opens a file or reads the clock.
package plan
