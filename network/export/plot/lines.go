package plot

import (
	"math"
	"sort"

	gplot "gonum.org/v1/plot"
	"gonum.org/v1/plot/vg"
	"gonum.org/v1/plot/vg/draw"

	"workheat/network/export/outcome"
)

// path returns the points of a curve on the canvas.
func (s *scene) path(c *outcome.Curve, x, y func(float64) vg.Length) []vg.Point {
	path := make([]vg.Point, len(c.Time))
	for i := range path {
		path[i] = vg.Point{X: x(s.axes.timeScale.Show(c.Time[i])), Y: y(s.axes.levelScale.Show(c.Value[i]))}
	}
	return path
}

// curve draws a path; a single point is drawn as a short dash.
func (s *scene) curve(c *draw.Canvas, path []vg.Point, style draw.LineStyle) {
	if len(path) == 1 {
		c.StrokeLine2(style, path[0].X, path[0].Y, path[0].X+legendSample, path[0].Y)
		return
	}
	c.StrokeLines(style, c.ClipLinesXY(path)...)
}

// limitText is how a limit is labelled.
func (s *scene) limitText(l *outcome.Line) string {
	return outcome.Clean(l.Name + " " + s.axes.level.Format(l.Temperature, 6) + " (" + l.Of() + ")")
}

// limitLabels writes the name of each limit just above or below its line, where fewest curves pass.
func (s *scene) limitLabels(c *draw.Canvas, paths [][]vg.Point, y func(float64) vg.Length) {
	const places = 24
	style := write(8, red, 0, 0)
	var taken []vg.Rectangle
	lines := make([]vg.Length, len(s.near))
	for i := range s.near {
		lines[i] = y(s.axes.levelScale.Show(s.near[i].Temperature))
	}
	for i := range s.near {
		text := clip(style, s.limitText(&s.near[i]), 0.6*(c.Max.X-c.Min.X))
		wide, high, line := style.Width(text), vg.Length(10), lines[i]
		var best vg.Rectangle
		least := math.Inf(1)
		for _, bottom := range [2]vg.Length{line + 1, line - high - 1} {
			for k := 0; k <= places; k++ {
				left := c.Min.X + 4 + vg.Length(k)/places*(c.Max.X-c.Min.X-wide-8)
				box := vg.Rectangle{Min: vg.Point{X: left, Y: bottom}, Max: vg.Point{X: left + wide, Y: bottom + high}}
				cost := crowd(box, c.Rectangle, paths, taken)
				for _, other := range lines {
					if other > bottom && other < bottom+high {
						cost += 10
					}
				}
				if cost < least {
					best, least = box, cost
				}
			}
		}
		taken = append(taken, best)
		c.FillPolygon(veil, []vg.Point{best.Min, {X: best.Max.X, Y: best.Min.Y}, best.Max, {X: best.Min.X, Y: best.Max.Y}})
		c.FillText(style, vg.Point{X: best.Min.X, Y: best.Min.Y + 1}, text)
	}
}

// crowd is the cost of a label in a box: the curves that pass through it, and far more for another label or
// the edge of the plot.
func crowd(box, area vg.Rectangle, paths [][]vg.Point, taken []vg.Rectangle) float64 {
	cost := 0.0
	if box.Max.Y > area.Max.Y || box.Min.Y < area.Min.Y {
		cost += 1000
	}
	for _, t := range taken {
		if box.Min.X < t.Max.X && t.Min.X < box.Max.X && box.Min.Y < t.Max.Y && t.Min.Y < box.Max.Y {
			cost += 100
		}
	}
	for _, p := range paths {
		if crosses(p, box) {
			cost++
		}
	}
	return cost
}

// crosses reports whether a path, rising in x, passes through a box. A piece that spans the box counts by
// its own ends, which errs on the side of crossing, and a little room is left at the sides.
func crosses(path []vg.Point, box vg.Rectangle) bool {
	const room = 3
	box.Min.X, box.Max.X = box.Min.X-room, box.Max.X+room
	from := sort.Search(len(path), func(i int) bool { return path[i].X >= box.Min.X })
	for i := max(1, from); i < len(path); i++ {
		a, b := path[i-1], path[i]
		if max(a.Y, b.Y) >= box.Min.Y && min(a.Y, b.Y) <= box.Max.Y {
			return true
		}
		if b.X > box.Max.X {
			break
		}
	}
	return false
}

// ends writes the number of each curve beside its end, spread so that none covers another.
func (s *scene) ends(c *draw.Canvas, p *gplot.Plot) {
	if s.numberWidth() == 0 {
		return
	}
	x, y := p.Transforms(c)
	type tag struct {
		row int
		at  vg.Point
	}
	var tags []tag
	for i := range s.curves {
		if path := s.path(&s.curves[i], x, y); len(path) > 0 && s.legend.rows[i].number != "" {
			tags = append(tags, tag{i, path[len(path)-1]})
		}
	}
	sort.SliceStable(tags, func(i, j int) bool { return tags[i].at.Y < tags[j].at.Y })
	heights := make([]vg.Length, len(tags))
	for i := range tags {
		heights[i] = tags[i].at.Y
	}
	spread(heights, 8.5, c.Min.Y, c.Max.Y)
	for i, t := range tags {
		r := &s.legend.rows[t.row]
		c.StrokeLine2(draw.LineStyle{Color: r.style.Color, Width: 0.5}, t.at.X, t.at.Y, c.Max.X+9, heights[i])
		c.FillText(bold(write(8, r.style.Color, 0, -0.5)), vg.Point{X: c.Max.X + 11, Y: heights[i]}, r.number)
	}
}

// spread moves rising heights apart to at least gap, keeping each close to where it was and, if there is
// room, all between low and high.
func spread(at []vg.Length, gap, low, high vg.Length) {
	type cluster struct {
		sum   vg.Length // of at[i] - i gap
		count int
	}
	var clusters []cluster
	for i, y := range at {
		clusters = append(clusters, cluster{y - vg.Length(i)*gap, 1})
		for k := len(clusters) - 1; k > 0; k-- {
			a, b := &clusters[k-1], clusters[k]
			if b.sum/vg.Length(b.count) > a.sum/vg.Length(a.count) {
				break
			}
			a.sum, a.count = a.sum+b.sum, a.count+b.count
			clusters = clusters[:k]
		}
	}
	top := high - vg.Length(len(at)-1)*gap
	i := 0
	for _, c := range clusters {
		base := max(low, min(top, c.sum/vg.Length(c.count)))
		for range c.count {
			at[i] = base + vg.Length(i)*gap
			i++
		}
	}
}
