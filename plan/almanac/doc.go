// Package almanac lists hourly values of the bodies, with v and d, and works
// single instants from them as a navigator does, in text, CSV and JSON.
package almanac
