package plot

import (
	"fmt"
	"image/color"

	gplot "gonum.org/v1/plot"
	"gonum.org/v1/plot/vg"
	"gonum.org/v1/plot/vg/draw"

	"workheat/network/export/outcome"
)

// Strips around the plot, in points.
const (
	border     = 12.0
	titleStrip = 32.0
	phaseStrip = 14.0
	footLine   = 10.0
	gutter     = 26.0 // between plot and legend, for the numbers of the curves
	narrow     = 10.0 // the same without numbers
)

// draw draws the whole picture: title, plot, legend, small print.
func (s *scene) draw(c draw.Canvas) {
	c.SetColor(color.White)
	c.Fill(c.Rectangle.Path())
	all := draw.Crop(c, border, -border, border, -border)
	foot := s.foot(&all)
	s.title(&all)
	wide := vg.Length(narrow)
	if s.numberWidth() > 0 {
		wide = gutter
	}
	area := draw.Crop(all, 0, -s.legend.wide-wide, foot, -titleStrip-phaseStrip)
	p := gplot.New()
	p.BackgroundColor = nil
	s.axes.set(p)
	p.Add(s)
	p.Draw(area)
	data := p.DataCanvas(area)
	s.ends(&data, p)
	side := draw.Crop(all, all.Max.X-all.Min.X-s.legend.wide, 0, 0, -titleStrip-phaseStrip+4)
	s.legend.draw(&side)
}

func (s *scene) title(c *draw.Canvas) {
	wide := c.Max.X - c.Min.X
	head, sub := bold(write(13, ink, 0, -1)), write(8, quiet, 0, -1)
	c.FillText(head, vg.Point{X: c.Min.X, Y: c.Max.Y}, clip(head, outcome.Clean(s.Title), wide))
	length := outcome.TimeWant(s.End)
	text := fmt.Sprintf("%s, %s, %s", s.Source, length.Format(s.End, 5), s.Program)
	c.FillText(sub, vg.Point{X: c.Min.X, Y: c.Max.Y - 18}, clip(sub, outcome.Clean(text), wide))
}

// foot writes the small print at the bottom and returns its height.
func (s *scene) foot(c *draw.Canvas) vg.Length {
	wide := c.Max.X - c.Min.X
	y := c.Min.Y
	line := func(text string, alarm bool) {
		if text == "" {
			return
		}
		style := write(7.5, quiet, 0, 0)
		if alarm {
			style = bold(write(8, red, 0, 0))
		}
		c.FillText(style, vg.Point{X: c.Min.X, Y: y}, clip(style, outcome.Clean(text), wide))
		y += footLine
	}
	line(s.Caution, false)
	for _, text := range s.Doubts() {
		line(text, true)
	}
	return y - c.Min.Y + 4
}

// Plot draws what lies inside the axes; it implements the plotter of the plotting library.
func (s *scene) Plot(c draw.Canvas, p *gplot.Plot) {
	x, y := p.Transforms(&c)
	s.phases(&c, x)
	s.grid(&c, p)
	paths := make([][]vg.Point, len(s.curves))
	for i := range s.curves {
		paths[i] = s.path(&s.curves[i], x, y)
	}
	for i, path := range paths {
		if s.curves[i].Held {
			s.curve(&c, path, s.styles[i])
		}
	}
	limit := draw.LineStyle{Color: red, Width: 1, Dashes: limitDash}
	for i := range s.near {
		at := y(s.axes.levelScale.Show(s.near[i].Temperature))
		c.StrokeLine2(limit, c.Min.X, at, c.Max.X, at)
	}
	for i, path := range paths {
		if !s.curves[i].Held {
			s.curve(&c, path, s.styles[i])
		}
	}
	s.limitLabels(&c, paths, y)
	frame := draw.LineStyle{Color: quiet, Width: 0.5}
	c.StrokeLines(frame, []vg.Point{c.Min, {X: c.Max.X, Y: c.Min.Y}, c.Max, {X: c.Min.X, Y: c.Max.Y}, c.Min})
	if len(s.curves) == 0 {
		c.FillText(write(11, quiet, -0.5, -0.5), c.Center(), "nothing was recorded")
	}
}

func (s *scene) grid(c *draw.Canvas, p *gplot.Plot) {
	x, y := p.Transforms(c)
	style := draw.LineStyle{Color: grid, Width: 0.5}
	for _, t := range p.X.Tick.Marker.Ticks(p.X.Min, p.X.Max) {
		c.StrokeLine2(style, x(t.Value), c.Min.Y, x(t.Value), c.Max.Y)
	}
	for _, t := range p.Y.Tick.Marker.Ticks(p.Y.Min, p.Y.Max) {
		c.StrokeLine2(style, c.Min.X, y(t.Value), c.Max.X, y(t.Value))
	}
}

const (
	leastBlock = 3.0 // narrower blocks are not marked
	leastMark  = 2.5 // of legs that follow each other closer the first is marked
)

// phases marks the blocks by pale bands with their names above, and the legs by short ticks at the top.
func (s *scene) phases(c *draw.Canvas, x func(float64) vg.Length) {
	at := func(t float64) vg.Length { return x(s.axes.timeScale.Show(t)) }
	style := write(8, quiet, 0, 0)
	for i, b := range s.blocks {
		from, to := at(b.start), at(b.end)
		if to-from < leastBlock {
			continue
		}
		if i%2 == 1 {
			c.FillPolygon(band, []vg.Point{{X: from, Y: c.Min.Y}, {X: to, Y: c.Min.Y}, {X: to, Y: c.Max.Y}, {X: from, Y: c.Max.Y}})
		}
		if i > 0 {
			c.StrokeLine2(draw.LineStyle{Color: edge, Width: 0.5}, from, c.Min.Y, from, c.Max.Y+9)
		}
		if text := clip(style, b.text, to-from-4); len([]rune(text)) > 2 {
			c.FillText(style, vg.Point{X: from + 3, Y: c.Max.Y + 2}, text)
		}
	}
	last := c.Min.X
	for _, t := range s.marks {
		if at(t)-last < leastMark {
			continue
		}
		last = at(t)
		c.StrokeLine2(draw.LineStyle{Color: edge, Width: 0.5}, last, c.Max.Y-4, last, c.Max.Y)
	}
}
