package material

import "workheat/network/element"

func glycolBrakeFluid() *element.Material {
	return &element.Material{
		Name:         "glycol brake fluid",
		About:        "glycol-ether brake fluid, DOT 3, DOT 4 or DOT 5.1",
		Source:       "density, c and k from memory; boiling points: 49 CFR 571.116 (FMVSS 116)",
		Density:      1050,
		Capacity:     element.Constant(2200),
		Conductivity: element.Constant(0.18),
		Low:          -40 + zeroCelsius, // coldest test of the standard
		High:         260 + zeroCelsius, // highest of the least boiling points
		Limits: []element.Limit{
			{Name: "DOT 3 wet boiling point", Temperature: 140 + zeroCelsius, Source: fluidSource},
			{Name: "DOT 4 wet boiling point", Temperature: 155 + zeroCelsius, Source: fluidSource},
			{Name: "DOT 5.1 wet boiling point", Temperature: 180 + zeroCelsius, Source: fluidSource},
			{Name: "DOT 3 dry boiling point", Temperature: 205 + zeroCelsius, Source: fluidSource},
			{Name: "DOT 4 dry boiling point", Temperature: 230 + zeroCelsius, Source: fluidSource},
			{Name: "DOT 5.1 dry boiling point", Temperature: 260 + zeroCelsius, Source: fluidSource},
		},
		Doubtful: "density, c and k are from memory only, without a published source (c 2000 to 2400 J/(kg K), " +
			"k 0.16 to 0.20 W/(m K), density 1020 to 1070 kg/m^3): give a measured value where the fluid's temperature matters",
	}
}

const fluidSource = "49 CFR 571.116 (FMVSS 116), least permitted; wet: with 3.7 % water"
