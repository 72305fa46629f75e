package track

// Error says what a reader met and what it allows, so that the user can mend
// the input.
type Error struct {
	Place   string // where in the file: a member, a vertex
	Met     string // the value found there
	Allowed string // what may stand there
	Hint    string // the next action
}

// Error writes "PLACE: MET (ALLOWED)".
func (e *Error) Error() string { return e.Place + ": " + e.Met + " (" + e.Allowed + ")" }
