/* Reads a calendar with libical and prints the number of its events; fails on
   any error that the library notes or any restriction of RFC 5545 it finds
   broken. Build: cc parse.c -lical */
#include <libical/ical.h>
#include <stdio.h>
#include <stdlib.h>

static int errors(icalcomponent *c) {
	int n = icalcomponent_count_properties(c, ICAL_XLICERROR_PROPERTY);
	icalcomponent *sub;
	for (sub = icalcomponent_get_first_component(c, ICAL_ANY_COMPONENT); sub; sub = icalcomponent_get_next_component(c, ICAL_ANY_COMPONENT))
		n += errors(sub);
	return n;
}

int main(void) {
	size_t size = 0, got;
	char *data = malloc(1 << 24);
	while ((got = fread(data + size, 1, (1 << 24) - 1 - size, stdin)) > 0)
		size += got;
	data[size] = 0;
	icalcomponent *cal = icalparser_parse_string(data);
	if (!cal)
		return fprintf(stderr, "not parsed\n"), 1;
	if (!icalrestriction_check(cal) || errors(cal))
		return fprintf(stderr, "%s\n", icalcomponent_as_ical_string(cal)), 1;
	printf("%d\n", icalcomponent_count_components(cal, ICAL_VEVENT_COMPONENT));
	return 0;
}
