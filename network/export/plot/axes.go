package plot

import (
	"math"
	"strconv"

	gplot "gonum.org/v1/plot"

	"workheat/network/export/outcome"
	"workheat/network/unit"
)

// axes is what the two axes show, each in its unit.
type axes struct {
	time, level             unit.Want
	timeScale, levelScale   unit.Scale
	end, bottom, top        float64
	timeStep, levelStep     float64
	timeSteps, levelSteps   int
	timeTitle, levelCaption string
}

func newAxes(end float64, curves []outcome.Curve, low, high float64) axes {
	a := axes{time: outcome.TimeWant(end), level: unit.Temperature, timeSteps: 12, levelSteps: 10}
	if len(curves) > 0 {
		a.level = curves[0].Want
	}
	a.timeScale, a.levelScale = a.time.Shown(), a.level.Shown()
	a.end = a.timeScale.Show(end)
	if !(a.end > 0) {
		a.end = 1
	}
	a.timeStep = outcome.Step(a.end, a.timeSteps)
	if math.IsNaN(low) {
		a.bottom, a.top, a.levelStep = 0, 100, 20
	} else {
		a.bottom, a.top, a.levelStep = outcome.Axis(a.levelScale.Show(low), a.levelScale.Show(high), a.levelSteps)
	}
	a.timeTitle = outcome.Head("time", a.time)
	a.levelCaption = outcome.Head("temperature", a.level)
	return a
}

// set sets the axes of a plot.
func (a *axes) set(p *gplot.Plot) {
	for _, axis := range []*gplot.Axis{&p.X, &p.Y} {
		label, tick := &axis.Label.TextStyle, &axis.Tick.Label
		*label = write(10, ink, label.XAlign, label.YAlign)
		*tick = write(9, ink, tick.XAlign, tick.YAlign)
		axis.Tick.LineStyle.Color, axis.Tick.Length = quiet, 4
		axis.LineStyle.Color = quiet
		axis.Padding = 0
	}
	p.X.Min, p.X.Max, p.X.Label.Text, p.X.Tick.Marker = 0, a.end, a.timeTitle, steps(a.timeStep)
	p.Y.Min, p.Y.Max, p.Y.Label.Text, p.Y.Tick.Marker = a.bottom, a.top, a.levelCaption, steps(a.levelStep)
}

// steps marks the multiples of a round step.
type steps float64

// Ticks implements the marker of an axis.
func (s steps) Ticks(low, high float64) []gplot.Tick {
	step := float64(s)
	decimals := outcome.Decimals(step)
	var ticks []gplot.Tick
	last := int(math.Floor(high/step + 1e-9))
	for k := int(math.Ceil(low/step - 1e-9)); k <= last && len(ticks) < 100; k++ {
		v := float64(k) * step
		ticks = append(ticks, gplot.Tick{Value: v, Label: strconv.FormatFloat(v, 'f', decimals, 64)})
	}
	return ticks
}
