// Reads a calendar with ical.js (its path is the first argument) and prints
// what it understood.
const ICAL = require(process.argv[2])
const text = require('fs').readFileSync(0, 'utf8')
ICAL.design.strict = true
const calendar = new ICAL.Component(ICAL.parse(text))
const compact = time => time.toJSDate().toISOString().replace(/[-:]|\.000/g, '')
const events = calendar.getAllSubcomponents('vevent').map(component => {
  const event = new ICAL.Event(component)
  return {
    uid: event.uid,
    start: compact(event.startDate),
    end: compact(event.endDate),
    summary: event.summary,
    description: event.description,
    alarm: component.getAllSubcomponents('valarm').map(a => a.getFirstPropertyValue('trigger').toSeconds())
  }
})
process.stdout.write(JSON.stringify(events))
