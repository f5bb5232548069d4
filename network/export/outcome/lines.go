package outcome

import (
	"math"
	"strings"
)

// A Line is a limit as it is drawn: once for all nodes that have it by the same name and temperature.
type Line struct {
	Name        string
	Nodes       []string
	Temperature float64 // K
}

// Of names the nodes of the line, three at the most.
func (l *Line) Of() string {
	const most = 3
	if len(l.Nodes) > most {
		return strings.Join(l.Nodes[:most], ", ") + ", ..."
	}
	return strings.Join(l.Nodes, ", ")
}

// Lines returns the limits of the curves in the order in which they first come up.
func Lines(curves []Curve) []Line {
	var lines []Line
	for i := range curves {
		for _, limit := range curves[i].Limits {
			k := 0
			for k < len(lines) && (lines[k].Name != limit.Name || lines[k].Temperature != limit.Temperature) {
				k++
			}
			if k == len(lines) {
				lines = append(lines, Line{Name: limit.Name, Temperature: limit.Temperature})
			}
			lines[k].Nodes = append(lines[k].Nodes, curves[i].Name)
		}
	}
	return lines
}

// A limit further above the curves than farSpans times their span, or of leastSpan if that is more, would
// press them flat. Chosen by eye.
const (
	farSpans  = 1.0
	leastSpan = 50 // K
)

// Range returns the lowest and highest temperature [K] that a picture of the curves must show, and parts
// the lines into those inside and those too far above to be drawn. Low and high are equal when all
// temperatures are; NaN when there is no curve.
func Range(curves []Curve, lines []Line) (low, high float64, near, far []Line) {
	low, high = math.Inf(1), math.Inf(-1)
	for i := range curves {
		for _, v := range curves[i].Value {
			low, high = math.Min(low, v), math.Max(high, v)
		}
	}
	if low > high {
		return math.NaN(), math.NaN(), nil, lines
	}
	reach := high + farSpans*math.Max(high-low, leastSpan)
	for _, l := range lines {
		if l.Temperature > reach {
			far = append(far, l)
			continue
		}
		near = append(near, l)
	}
	for _, l := range near {
		low, high = math.Min(low, l.Temperature), math.Max(high, l.Temperature)
	}
	return low, high, near, far
}

// Axis returns round ends and the step of an axis that shows low to high, both in its unit, in at most that
// many steps, with a little room above.
func Axis(low, high float64, steps int) (from, to, step float64) {
	if !(high-low > 1e-6*math.Max(1, math.Abs(high))) {
		low, high = low-1, high+1
	}
	high += 0.04 * (high - low)
	step = Step(high-low, max(1, steps-2))
	from = step * math.Floor(low/step+1e-9)
	return from, step * math.Ceil(high/step-1e-9), step
}
