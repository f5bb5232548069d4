package unit

import (
	"math"
	"testing"
	"time"
)

// Whatever the text, Parse ends soon, does not panic, points inside the text,
// and returns only finite values and levels above absolute zero.
func FuzzParse(f *testing.F) {
	for _, text := range []string{
		"450 J/(kg K)", "25 W m^-2 K^-1", "1.2e-5 m²/s", "20 degC + 5 K", "-(20 degC)", "80 degC - amb",
		"2 * pi * r^2", "1'200,5 kg", "m2^0.5", "((((1", "1 2 3", "5 W/m·K", "\xff\x00", "6 % degC", "⁻", "5 m⁻²³", "1e9999", ".",
	} {
		f.Add(text)
	}
	f.Fuzz(func(t *testing.T, text string) {
		begun := time.Now()
		q, fault := Parse(text, testParams)
		if took := time.Since(begun); took > time.Second {
			t.Errorf("Parse(%q) took %v", text, took)
		}
		for _, w := range []Want{Number, Temperature, TemperatureDifference, Conductance} {
			_, wf := w.Read(text, testParams)
			inside(t, text, wf)
			_, wf = w.Scale(text)
			inside(t, text, wf)
		}
		inside(t, text, fault)
		if fault != nil {
			return
		}
		if math.IsNaN(q.Value) || math.IsInf(q.Value, 0) {
			t.Errorf("Parse(%q) = %v", text, q.Value)
		}
		if (q.Temp != NotTemp) != (q.Dim == pureTemperature) {
			t.Errorf("Parse(%q): dimension %v with meaning %d", text, q.Dim, q.Temp)
		}
		if q.Temp == Level && q.Value < 0 {
			t.Errorf("Parse(%q) lies below absolute zero: %v", text, q.Value)
		}
		if back, again := Parse("1 "+q.Dim.String(), nil); q.Dim != (Dim{}) && (again != nil || back.Dim != q.Dim) {
			t.Errorf("%q is in %v, which is read as %v: %v", text, q.Dim, back.Dim, again)
		}
	})
}

func inside(t *testing.T, text string, f *Fault) {
	t.Helper()
	if f == nil {
		return
	}
	if f.Start < 0 || f.Start > f.End || f.End > len(text) || f.Text == "" {
		t.Errorf("fault of %q at %d:%d: %q", text, f.Start, f.End, f.Text)
	}
}
