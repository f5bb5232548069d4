package element

// A Value is what one field of a declaration came to.
type Value struct {
	Number   float64   // Quantity and Number: SI
	Text     string    // Text
	Nodes    []int     // NodePair and Shares: node indices
	Shares   []float64 // Shares: one for each node
	Signal   int       // Signal and BodyName: signal index
	Body     int       // BodyName: body index
	Material *Material // MaterialOf
}

// A Declaration is one element of a netlist as its kind sees it: checked against the kind's fields, with
// defaults filled in, in SI, with nodes and signals as indices.
type Declaration struct {
	Name   string
	Values map[string]Value

	// Brake returns the index of the signal that carries the braking power of a body [W].
	Brake func(body int) int
	// Vehicle returns a declared body.
	Vehicle func(body int) Vehicle
	// Report takes a fault: the key it concerns (empty: the whole element), what is wrong, what to do.
	Report func(key, text, help string)
}

// Has reports whether the key was written or has a default.
func (d *Declaration) Has(key string) bool {
	_, ok := d.Values[key]
	return ok
}

// Number returns the SI value of a Quantity or Number field, or zero if it was left out.
func (d *Declaration) Number(key string) float64 { return d.Values[key].Number }

// Signal returns the signal index of a Signal or BodyName field, or -1 if it was left out.
func (d *Declaration) Signal(key string) int {
	if v, ok := d.Values[key]; ok {
		return v.Signal
	}
	return -1
}

// Between returns the two nodes of a NodePair field.
func (d *Declaration) Between(key string) (a, b int) {
	v := d.Values[key]
	return v.Nodes[0], v.Nodes[1]
}
