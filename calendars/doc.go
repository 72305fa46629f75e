// Package calendars writes a plan as an iCalendar file (RFC 5545): one event
// for each window, in UTC, with an alarm and the altitudes to set.
//
// It is the only code that calls golang-ical, and keeps clear of what that
// library lets through: every text is cleaned before it goes in, properties
// that are not text are built here, and the result is written in one piece.
package calendars
