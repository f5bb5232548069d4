package outcome_test

import (
	"math"
	"strings"
	"testing"

	"workheat/network/element"
	"workheat/network/export/outcome"
	"workheat/network/export/outcome/outcometest"
	"workheat/network/record"
)

func TestStepIsTheSmallestRoundOne(t *testing.T) {
	for _, c := range []struct {
		span float64
		most int
		want float64
	}{
		{2400, 2000, 2}, {2000, 2000, 1}, {2000.1, 2000, 2}, {1, 10, 0.1}, {40, 12, 5}, {0.003, 10, 0.0005},
		{0, 10, 1}, {-3, 10, 1}, {math.NaN(), 10, 1}, {math.Inf(1), 10, 1}, {7, 0, 10},
	} {
		if got := outcome.Step(c.span, c.most); math.Abs(got-c.want) > 1e-12*c.want {
			t.Errorf("Step(%g, %d) = %g, want %g", c.span, c.most, got, c.want)
		}
	}
}

func TestDecimals(t *testing.T) {
	for _, c := range []struct {
		step float64
		want int
	}{{1, 0}, {20, 0}, {0.5, 1}, {0.25, 2}, {0.1, 1}, {0.0005, 4}, {1. / 3, 6}} {
		if got := outcome.Decimals(c.step); got != c.want {
			t.Errorf("Decimals(%g) = %d, want %d", c.step, got, c.want)
		}
	}
}

func TestAxisHoldsItsRange(t *testing.T) {
	for _, c := range [][2]float64{{20, 511}, {20, 20}, {-40, -39.5}, {0, 0}, {1e-3, 2e-3}, {-1e6, 1e6}, {293.15, 293.15}} {
		from, to, step := outcome.Axis(c[0], c[1], 10)
		if !(from <= c[0] && to >= c[1] && to > from) {
			t.Errorf("Axis(%g, %g) = %g to %g", c[0], c[1], from, to)
		}
		if n := (to - from) / step; n > 10.5 || n < 1.5 {
			t.Errorf("Axis(%g, %g) has %g steps of %g", c[0], c[1], n, step)
		}
	}
}

func TestTableChoosesItsInterval(t *testing.T) {
	for _, end := range []float64{0.01, 1, 1999, 2000, 2400, 86400} {
		s, err := outcometest.Run(2, end).Table(1e6)
		if err != nil {
			t.Fatal(err)
		}
		n := len(s.Time)
		if n > outcome.TableRows || n < outcome.TableRows/3 || s.Time[n-1] != end {
			t.Errorf("a run of %g s: %d rows, the last at %g", end, n, s.Time[n-1])
		}
	}
}

func TestTableRefusesTooManyRowsBeforeSampling(t *testing.T) {
	r := outcometest.Run(2, 2400)
	r.Interval = 1e-6
	r.Series = func(float64) *record.Series { t.Error("was sampled all the same"); return nil }
	if _, err := r.Table(1000); err == nil || !strings.Contains(err.Error(), "5 s or more") {
		t.Errorf("got %v, want a refusal that names an interval", err)
	}
}

func TestPeaksSurviveThinning(t *testing.T) {
	const n, end = 4, 2400.0
	curves, left := outcometest.Run(n, end).Curves(100, 30)
	if len(curves) != n || left != 0 {
		t.Fatalf("%d curves, %d left out", len(curves), left)
	}
	for i := range curves {
		c := &curves[i]
		want, when := outcometest.Peak(n, i, end)
		if got := c.Highest(); got != want {
			t.Errorf("%s: highest %v, want %v at %g s", c.Name, got, want, when)
		}
		if k := len(c.Time) - 1; c.Time[0] != 0 || c.Time[k] != end {
			t.Errorf("%s: from %g to %g s", c.Name, c.Time[0], c.Time[k])
		}
		if len(c.Time) > 2*100+3 {
			t.Errorf("%s: %d points for 100 buckets", c.Name, len(c.Time))
		}
		for k := 1; k < len(c.Time); k++ {
			if c.Time[k] <= c.Time[k-1] {
				t.Errorf("%s: time does not rise at %g s", c.Name, c.Time[k])
			}
		}
		if c.Held != (i == n-1) {
			t.Errorf("%s: held is %v", c.Name, c.Held)
		}
	}
	if got := len(curves[n-1].Time); got != 2 {
		t.Errorf("a level curve has %d points, want its two ends", got)
	}
}

func TestASpikeOfOneSampleSurvives(t *testing.T) {
	r := outcometest.Run(1, 1000)
	inner := r.Series
	r.Summary = nil
	at := 0.0
	r.Series = func(h float64) *record.Series {
		s := inner(h)
		y := s.Columns[0].Values
		y[0], y[1], y[len(y)-1] = math.NaN(), math.Inf(1), math.NaN()
		y[len(y)/2+1] = 5000
		at = s.Time[len(y)/2+1]
		return s
	}
	curves, _ := r.Curves(50, 30)
	for k, v := range curves[0].Value {
		if v == 5000 && curves[0].Time[k] == at {
			return
		}
	}
	t.Errorf("the spike at %g s is lost: highest %g", at, curves[0].Highest())
}

func TestHottestCurvesAreKept(t *testing.T) {
	curves, left := outcometest.Run(10, 2400).Curves(50, 3)
	if left != 7 || len(curves) != 3 {
		t.Fatalf("%d kept, %d left out", len(curves), left)
	}
	for i, c := range curves {
		if c.Name != outcometest.Name(i) {
			t.Errorf("curve %d is %s", i, c.Name)
		}
	}
}

func TestNothingRecorded(t *testing.T) {
	r := &outcome.Run{Series: func(float64) *record.Series { return nil }}
	if curves, left := r.Curves(100, 30); len(curves) != 0 || left != 0 {
		t.Errorf("%d curves of nothing", len(curves))
	}
	if low, high, near, far := outcome.Range(nil, nil); !math.IsNaN(low) || !math.IsNaN(high) || near != nil || far != nil {
		t.Errorf("range of nothing: %g to %g", low, high)
	}
}

func TestLimitsAreMergedAndFarOnesSetApart(t *testing.T) {
	fade := element.Limit{Name: "fade", Temperature: 600}
	far := element.Limit{Name: "melting", Temperature: 1800}
	curves := []outcome.Curve{
		{Name: "a", Limits: []element.Limit{fade, far}, Time: []float64{0, 1}, Value: []float64{300, 500}},
		{Name: "b", Limits: []element.Limit{fade}, Time: []float64{0, 1}, Value: []float64{300, 400}},
	}
	lines := outcome.Lines(curves)
	if len(lines) != 2 || lines[0].Of() != "a, b" || lines[1].Of() != "a" {
		t.Fatalf("got lines %+v", lines)
	}
	low, high, near, beyond := outcome.Range(curves, lines)
	if low != 300 || high != 600 || len(near) != 1 || len(beyond) != 1 || beyond[0].Name != "melting" {
		t.Errorf("range %g to %g, near %v, far %v", low, high, near, beyond)
	}
}

func TestDoubts(t *testing.T) {
	r := outcometest.Run(2, 100)
	if d := r.Doubts(); len(d) != 0 {
		t.Errorf("a sound run has doubts: %q", d)
	}
	r.Interrupted, r.Book.Closed, r.Book.Checks[1].Passed = true, false, false
	d := r.Doubts()
	if len(d) != 2 || !strings.Contains(d[0], "interrupted at 100 s") || !strings.Contains(d[1], "NOT CLOSED") || !strings.Contains(d[1], "recount") {
		t.Errorf("got doubts %q", d)
	}
}

func TestClean(t *testing.T) {
	if got, want := outcome.Clean("a\nb\x00c\xffd\u00e9\ufffe"), "a b c d\u00e9 "; got != want {
		t.Errorf("got %q, want %q", got, want)
	}
}
