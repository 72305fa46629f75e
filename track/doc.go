// Package track knows where the ship is: routes, the sailings between their
// waypoints, the DR position at any instant, and the clock the ship keeps.
//
// A [Route] comes from a route reader such as [ReadGeoJSON]. [Route.Sail]
// gives it a departure and a speed and makes it a [Passage], whose
// [Passage.At] tells position, course and speed at any instant.
//
// Angles are [unit.Angle]; latitude is north positive in [-90°, 90°],
// longitude east positive in (-180°, 180°], course clockwise from true north
// in [0°, 360°). Distances are in international nautical miles of 1852 m on
// the WGS84 ellipsoid, speeds in knots.
package track
