package element

// A Material is what nodes and conductances may be made of. Curves are in kelvin and SI.
type Material struct {
	Name    string
	About   string
	Source  string  // of the capacity and conductivity, with "from memory" where so
	Density float64 // kg/m^3; 0: not known

	Capacity     *Curve // specific heat capacity c(T), J/(kg K) over K
	Conductivity *Curve // thermal conductivity k(T), W/(m K) over K; nil: not known

	Low, High float64 // K, range that the source covers; outside the end values are kept and a warning given
	Limits    []Limit // service limits worth knowing, for information
	Doubtful  string  // what is only from memory or indicative; shown as a warning when used; empty: none
}

// A Limit is a temperature that must not be passed.
type Limit struct {
	Name        string
	Temperature float64 // K
	Source      string
}
