package material

import "workheat/network/element"

func organicLining() *element.Material {
	return &element.Material{
		Name:         "organic lining",
		About:        "resin-bonded friction lining of pads and shoes",
		Source:       "density 2400, k 1.31, c 1230: one set of values used in published student brake studies",
		Density:      2400,
		Capacity:     element.Constant(1230),
		Conductivity: element.Constant(1.31),
		Low:          0 + zeroCelsius,
		High:         400 + zeroCelsius, // about the upper continuous limit below
		Limits: []element.Limit{
			{Name: "continuous, weakest", Temperature: 260 + zeroCelsius, Source: liningSource + "500 degF"},
			{Name: "continuous, best", Temperature: 399 + zeroCelsius, Source: liningSource + "750 degF"},
		},
		Doubtful: "one set of values without temperature dependence; linings differ widely (from memory: density 2400 to 2600, " +
			"k 1.2 to 1.5, c 1100 to 1470). Give the lining's own values where they are known",
	}
}

const liningSource = "Shigley, Mechanical Engineering Design, Table 16-3, rigid moulded non-asbestos: "
