package outcome

import (
	"math"
	"sort"

	"workheat/network/element"
	"workheat/network/record"
	"workheat/network/unit"
)

// A Curve is the temperature of one node over time, thinned for drawing.
type Curve struct {
	Name   string
	Held   bool
	Want   unit.Want
	Limits []element.Limit
	Time   []float64 // s, rising
	Value  []float64 // K
}

// perBucket is how many samples a bucket is picked from: enough that a corner between two samples moves by
// less than a drawn line is wide.
const perBucket = 8

// Curves returns the temperatures of the run with at most about 2 buckets points each. The lowest and the
// highest sample of each bucket of time are kept, so is the highest point of the summary, which may lie
// between samples. When there are more than most nodes the hottest are taken, held ones last; left says how
// many were left out.
func (r *Run) Curves(buckets, most int) (curves []Curve, left int) {
	s := r.sample(Step(r.End, perBucket*buckets))
	for i := range s.Columns {
		c := &s.Columns[i]
		if c.Group != record.Temperatures || len(c.Values) == 0 {
			continue
		}
		curve := Curve{Name: c.Name, Want: c.Want, Limits: c.Limits}
		curve.Time, curve.Value = thin(s.Time, c.Values, r.End, buckets)
		r.addPeak(&curve)
		curves = append(curves, curve)
	}
	return hottest(curves, most)
}

// addPeak marks a held node, and puts the highest point of the summary into its curve if the samples missed it.
func (r *Run) addPeak(c *Curve) {
	for i := range r.Summary {
		s := &r.Summary[i]
		if s.Name != c.Name {
			continue
		}
		c.Held = s.Held
		if s.Highest > c.Highest() && s.When >= 0 && s.When <= r.End {
			at := sort.SearchFloat64s(c.Time, s.When)
			c.Time = insert(c.Time, at, s.When)
			c.Value = insert(c.Value, at, s.Highest)
		}
		return
	}
}

func insert(x []float64, at int, v float64) []float64 {
	x = append(x, 0)
	copy(x[at+1:], x[at:])
	x[at] = v
	return x
}

// Highest returns the highest temperature of the curve [K], or -Inf if it has no point.
func (c *Curve) Highest() float64 {
	high := math.Inf(-1)
	for _, v := range c.Value {
		high = math.Max(high, v)
	}
	return high
}

// hottest returns at most that many curves, in their order, and how many were left out.
func hottest(curves []Curve, most int) ([]Curve, int) {
	if len(curves) <= most {
		return curves, 0
	}
	rank := make([]int, len(curves))
	for i := range rank {
		rank[i] = i
	}
	sort.SliceStable(rank, func(i, j int) bool {
		a, b := &curves[rank[i]], &curves[rank[j]]
		if a.Held != b.Held {
			return b.Held
		}
		return a.Highest() > b.Highest()
	})
	rank = rank[:most]
	sort.Ints(rank)
	kept := make([]Curve, most)
	for i, k := range rank {
		kept[i] = curves[k]
	}
	return kept, len(curves) - most
}

// thin keeps the first, the last, and the lowest and highest sample of each of that many equal buckets of
// [0, end], in order; of a level stretch only its ends. Samples that are not finite are left out.
func thin(t, y []float64, end float64, buckets int) (time, value []float64) {
	keep := func(i int) {
		if k := len(time); k > 0 && time[k-1] >= t[i] {
			return
		}
		if k := len(value); k > 1 && value[k-1] == y[i] && value[k-2] == y[i] {
			time[k-1] = t[i]
			return
		}
		time, value = append(time, t[i]), append(value, y[i])
	}
	n := min(len(t), len(y))
	for i := 0; i < n; {
		bucket := bucketOf(t[i], end, buckets)
		low, high, last := -1, -1, i
		for ; i < n && bucketOf(t[i], end, buckets) == bucket; i++ {
			if !finite(y[i]) {
				continue
			}
			if low < 0 || y[i] < y[low] {
				low = i
			}
			if high < 0 || y[i] > y[high] {
				high = i
			}
			last = i
		}
		if low < 0 {
			continue
		}
		if len(time) == 0 {
			keep(firstFinite(y))
		}
		keep(min(low, high))
		keep(max(low, high))
		if i == n {
			keep(last)
		}
	}
	return time, value
}

func bucketOf(t, end float64, buckets int) int {
	if !(end > 0) {
		return 0
	}
	return min(int(t/end*float64(buckets)), buckets-1)
}

func finite(v float64) bool { return !math.IsNaN(v - v) }

func firstFinite(y []float64) int {
	for i, v := range y {
		if finite(v) {
			return i
		}
	}
	return 0
}
