package material

import "workheat/network/element"

// nodularIronFactor brings the mean capacity of iron over 20 to 200 degC to the 502 J/(kg K) given for
// spheroidal-graphite iron grade 450.
const nodularIronFactor = 1.037516

func nodularIron() *element.Material {
	return &element.Material{
		Name:  "nodular iron",
		About: "spheroidal-graphite cast iron of calipers, carriers, hubs and wind-turbine discs, about grade 450",
		Source: "density 7085, k 36, c 502: spheroidal-graphite iron grade 450 of a published wind-turbine brake study; " +
			"c(T): NIST WebBook iron (Chase 1998, Shomate form to 700 K, rows above) times 1.0375, so that the mean over 20 to 200 degC is 502 J/(kg K)",
		Density:      7085,
		Capacity:     element.MustCurve(likeIron(nodularIronFactor)),
		Conductivity: element.Constant(36),
		Low:          ironLow,
		High:         ironHigh,
		Doubtful: "c(T) is that of pure iron scaled to one published value; it lies 10 % above the mean of EN 1563 " +
			"(515 over 20-500 degC, from memory), which gives hotter parts. k is one value; " +
			"EN 1563 gives 31 to 36 W/(m K) at 300 degC by grade, from memory",
	}
}
