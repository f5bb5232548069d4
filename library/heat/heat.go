// Package heat holds the kinds of elements that carry heat from node to node or give it to a node.
package heat

import (
	"math"

	"workheat/network/element"
	"workheat/network/unit"
)

// A link is the two nodes that a path joins.
type link struct{ a, b int32 }

func linkOf(d *element.Declaration) link {
	a, b := d.Between("between")
	return link{int32(a), int32(b)}
}

// path returns the link as one path whose flow depends on its two ends.
func (l link) path(balanced bool) []element.Path {
	a, b := int(l.a), int(l.b)
	return []element.Path{{A: a, B: b, Deps: []int{a, b}, Balanced: balanced}}
}

// laws holds the flow of each path of a batch once more, written straight from the element's law. A batch
// embeds it to meet the contract's Recount.
type laws []func(s *element.State) float64

// Recount returns the flow [W] of a path by its law.
func (l laws) Recount(path int, s *element.State) float64 { return l[path](s) }

// again appends the law of the next path.
func (l *laws) again(law func(s *element.State) float64) { *l = append(*l, law) }

// between is the field of the two ends.
func between(about string) element.Field {
	return element.Field{Key: "between", About: about, Type: element.NodePair}.Must()
}

// area is the field of the surface that the heat passes.
func area(about string) element.Field {
	return element.Field{Key: "area", About: about, Want: unit.Area}.Positive()
}

// factor is the field that scales a whole conductance, for fits and sweeps.
func factor() element.Field {
	f := element.Field{Key: "factor", About: "multiplies the flow, for fitting to a test", Type: element.Number, Want: unit.Number, Default: "1"}
	return notNegative(f)
}

// notNegative limits a field to zero and above.
func notNegative(f element.Field) element.Field { return f.From(0, math.MaxFloat64) }
