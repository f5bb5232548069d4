package plot

import (
	"fmt"
	"math"
	"strconv"

	"gonum.org/v1/plot/vg"
	"gonum.org/v1/plot/vg/draw"

	"workheat/network/export/outcome"
)

// A legend is the strip at the right: how each node is drawn, and its highest temperature.
type legend struct {
	rows  []legendRow
	more  string   // nodes that are not drawn, or empty
	notes []string // limits that are not drawn
	wide  vg.Length
	peak  string // head of the column of peaks
}

type legendRow struct {
	style  draw.LineStyle
	number string // of the curve, or empty
	name   string
	peak   string
}

const (
	legendLine   = 13.0
	legendSample = 26.0 // length of the piece of line
	legendNumber = 16.0
	legendName   = 150.0 // widest name
	legendGap    = 6.0
)

func newLegend(s *scene) legend {
	l := legend{peak: outcome.Head("highest", s.axes.level)}
	nameStyle, peakStyle := write(9, ink, 0, 0), write(8, quiet, 0, 0)
	names, peaks := nameStyle.Width("node"), peakStyle.Width(l.peak)
	free := 0
	for i := range s.curves {
		c := &s.curves[i]
		r := legendRow{style: s.styles[i], peak: "-"}
		name := outcome.Clean(c.Name)
		if c.Held {
			name += " (held)"
		} else {
			free++
			r.number = s.number(free)
		}
		if high := c.Highest(); !math.IsInf(high, 0) {
			r.peak = strconv.FormatFloat(s.axes.levelScale.Show(high), 'f', 1, 64)
		}
		r.name = clip(nameStyle, name, legendName)
		names, peaks = max(names, nameStyle.Width(r.name)), max(peaks, nameStyle.Width(r.peak))
		l.rows = append(l.rows, r)
	}
	l.wide = legendSample + legendGap + s.numberWidth() + names + 2*legendGap + peaks
	l.note(s)
	return l
}

// note fills the small print: what is not drawn.
func (l *legend) note(s *scene) {
	small := write(8, red, 0, 0)
	if s.left > 0 {
		l.more = fmt.Sprintf("and %d cooler nodes", s.left)
	}
	if len(s.far) > 0 {
		l.notes = append(l.notes, "limits above the scale:")
	}
	for i := range s.far {
		if i == 8 {
			l.notes = append(l.notes, fmt.Sprintf("and %d more", len(s.far)-i))
			break
		}
		l.notes = append(l.notes, clip(small, s.limitText(&s.far[i]), l.wide))
	}
}

// number returns the number of the k-th free curve, empty when there are few.
func (s *scene) number(k int) string {
	if s.numberWidth() == 0 {
		return ""
	}
	return strconv.Itoa(k)
}

// numberWidth is the width that numbers take in the legend, zero when there are few curves.
func (s *scene) numberWidth() vg.Length {
	free := 0
	for i := range s.curves {
		if !s.curves[i].Held {
			free++
		}
	}
	if free <= numbered {
		return 0
	}
	return legendNumber
}

func (l *legend) height() vg.Length {
	return vg.Length(len(l.rows)+len(l.notes)+3) * legendLine
}

// draw draws the legend from the top left corner of c down.
func (l *legend) draw(c *draw.Canvas) {
	if len(l.rows) == 0 {
		return
	}
	left, right := c.Min.X, c.Min.X+l.wide
	y := c.Max.Y - legendLine/2
	number := left + legendSample + legendGap
	name := number
	if l.rows[0].number != "" || l.rows[len(l.rows)-1].number != "" {
		name += legendNumber
	}
	c.FillText(write(8, quiet, 0, -0.5), vg.Point{X: name, Y: y}, "node")
	c.FillText(write(8, quiet, -1, -0.5), vg.Point{X: right, Y: y}, l.peak)
	for i := range l.rows {
		y -= legendLine
		r := &l.rows[i]
		c.StrokeLine2(r.style, left, y, left+legendSample, y)
		c.FillText(bold(write(8, r.style.Color, 0, -0.5)), vg.Point{X: number, Y: y}, r.number)
		c.FillText(write(9, ink, 0, -0.5), vg.Point{X: name, Y: y}, r.name)
		c.FillText(write(9, ink, -1, -0.5), vg.Point{X: right, Y: y}, r.peak)
	}
	if l.more != "" {
		y -= legendLine
		c.FillText(write(8, quiet, 0, -0.5), vg.Point{X: name, Y: y}, l.more)
	}
	y -= legendGap
	for _, note := range l.notes {
		y -= legendLine
		c.FillText(write(8, red, 0, -0.5), vg.Point{X: left, Y: y}, note)
	}
}
