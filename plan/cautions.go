package plan

// Cautions stand in every output.
var Cautions = []string{
	"A plan is an aid, not a means of navigation.",
	"Altitudes are for the DR position and are approximate.",
	"Never look at the Sun without the sextant's shades.",
	"Keep a proper lookout while taking sights; one hand for the ship at the rail.",
	"Reduce sights with official data and check the fix by every other means.",
	"Follow the flag State's, the company's and the master's orders.",
}
