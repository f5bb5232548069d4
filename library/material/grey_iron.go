package material

import "workheat/network/element"

// greyIronFactor brings the mean capacity of iron over 20 to 200 degC to 492.93 J/(kg K), the mean of the
// three single values seen for grey iron: 490 (ISO 250, an open data sheet), 490 (ASTM 40, as used in
// published student scripts) and 498.8 (Adamowicz, from his diffusivity). Data sheets give the mean over
// 20 to 200 degC as a rule.
const greyIronFactor = 1.018778

// greyIronConductivity is k of EN-GJL-250 after EN 1561 Annex A, W/(m K) over degC, from memory.
var greyIronConductivity = [][2]float64{{100, 48.5}, {200, 47.5}, {300, 46.5}, {400, 45.0}, {500, 44.5}}

func greyIron() *element.Material {
	k := make([]float64, len(greyIronConductivity))
	at := make([]float64, len(greyIronConductivity))
	for i, row := range greyIronConductivity {
		at[i], k[i] = row[0], row[1]
	}
	return &element.Material{
		Name:  "grey iron",
		About: "flake-graphite cast iron of brake discs and drums, about EN-GJL-250",
		Source: "c: NIST WebBook iron (Chase 1998, Shomate form to 700 K, rows above) times 1.0188, so that the mean over 20 to 200 degC is that of " +
			"single values from an ISO 250 data sheet (490), ASTM 40 (490) and Adamowicz (498.8 J/(kg K)); " +
			"k: EN 1561 Annex A, EN-GJL-250, from memory; density: data sheet of grade 150, and EN 1561 from memory",
		Density:      7200,
		Capacity:     element.MustCurve(likeIron(greyIronFactor)),
		Conductivity: element.MustCurve(kelvin(at), k),
		Low:          ironLow,
		High:         ironHigh,
		Limits: []element.Limit{
			{Name: "iron anneals", Temperature: 649 + zeroCelsius, Source: "trade advice for racing discs, 1200 degF in the bulk"},
		},
		Doubtful: "c(T) is that of pure iron scaled to single data-sheet values; it lies 7 to 9 % above the means of " +
			"EN 1561 (460 over 20-200 degC, 535 over 20-600 degC, from memory), which give hotter discs. " +
			"k is from memory and grades differ: data sheets and papers give 46 to 53 W/(m K) near 20 degC",
	}
}
