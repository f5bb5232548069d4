// Package library is the catalogue of what a netlist may be written with: every kind of element and every
// material.
package library

import (
	"workheat/library/friction"
	"workheat/library/heat"
	"workheat/library/material"
	"workheat/library/motion"
	"workheat/network/element"
)

// kinds has one row for each kind, in the order in which they are shown.
var kinds = []func() *element.Kind{
	heat.Conduction,
	heat.Contact,
	heat.Convection,
	heat.RotatingDisc,
	heat.VehicleRotor,
	heat.VentPassage,
	heat.Radiation,
	heat.GivenHeat,
	motion.RoadVehicle,
	friction.Pad,
}

// Catalogue returns all kinds and materials. The materials are shared between calls and read only.
func Catalogue() *element.Catalogue {
	c := &element.Catalogue{Materials: material.All()}
	for _, kind := range kinds {
		c.Kinds = append(c.Kinds, kind())
	}
	return c
}
