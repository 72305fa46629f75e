"""Reads a calendar with python3-icalendar and prints what it understood."""
import json
import sys
from icalendar import Calendar

cal = Calendar.from_ical(sys.stdin.buffer.read())
if cal.errors:
    sys.exit("errors: %r" % cal.errors)
events = []
for e in cal.walk("VEVENT"):
    if e.errors:
        sys.exit("errors: %r" % e.errors)
    events.append({
        "uid": str(e["UID"]),
        "start": e.decoded("DTSTART").strftime("%Y%m%dT%H%M%SZ"),
        "end": e.decoded("DTEND").strftime("%Y%m%dT%H%M%SZ"),
        "summary": str(e["SUMMARY"]),
        "description": str(e["DESCRIPTION"]),
        "alarm": [int(a.decoded("TRIGGER").total_seconds()) for a in e.walk("VALARM")],
    })
json.dump(events, sys.stdout)
