package network_test

import (
	"context"
	"fmt"
	"strings"
	"testing"

	"workheat/network"
)

// The power into a node without mass jumps again and again, to temperatures at which round-off alone is above a
// thousandth of the tightest tolerance: its balance must be taken as settled each time.
func TestMasslessSettlesAtTightTolerance(t *testing.T) {
	var rows strings.Builder
	for k := range 300 {
		from, to := 11*k, 11*(k+1)
		power := 1000 + 731*(k*k%997)
		fmt.Fprintf(&rows, `, ["%d s", "%d W"], ["%d s", "%d W"]`, from, power, to, power+k)
	}
	text := `{"workheat": 1,
	"nodes": {"face": {"massless": true}, "rim": {"mass": "400 kg", "material": "aluminium"}, "hub": {"mass": "900 kg", "material": "nodular iron"}, "air": {"held": "18 degC"}},
	"conductances": {"skin": {"kind": "conduction", "between": ["face", "rim"], "material": "grey iron", "area": "11.4 cm^2", "length": "0.5 mm"},
		"joint": {"kind": "contact", "between": ["face", "hub"], "coefficient": "2588.1 W/(m^2 K)", "area": "210.8 cm^2"},
		"film": {"kind": "convection", "between": ["rim", "air"], "coefficient": "300 W/(m^2 K)", "area": "3 m^2"}},
	"sources": {"rubbing": {"kind": "given heat", "into": "face", "power": {"table": [` + rows.String()[2:] + `]}}},
	"duty": [{"rest": {"for": "3300 s"}}]}`
	for _, rel := range []float64{1e-8, 1e-9, 1e-10} {
		res := load(t, text, nil).Run(context.Background(), network.Options{Rel: rel})
		if res.Failure != nil {
			t.Errorf("%g: %v", rel, res.Failure)
		}
	}
}
