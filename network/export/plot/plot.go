// Package plot draws the temperatures of a run over time, with limits and phases, as a PNG or SVG picture.
//
// Every curve is thinned to the lowest and highest point of each column of pixels, so no peak is lost.
package plot

import (
	"bytes"
	"image/png"
	"io"

	"gonum.org/v1/plot/vg"
	"gonum.org/v1/plot/vg/draw"
	"gonum.org/v1/plot/vg/vgimg"
	"gonum.org/v1/plot/vg/vgsvg"

	"workheat/network/export/outcome"
)

const (
	width    = 11 * vg.Inch
	height   = 6.2 * vg.Inch
	dpi      = 120
	buckets  = 1000 // about the pixel columns of the PNG's plot area
	curves   = 30   // drawn at the most
	numbered = 6    // above this many curves their ends are numbered
)

// PNG writes the picture as a PNG of 120 dots an inch.
func PNG(w io.Writer, o *outcome.Run) error {
	s := newScene(o)
	c := vgimg.NewWith(vgimg.UseWH(width, s.height()), vgimg.UseDPI(dpi))
	s.draw(draw.New(c))
	encoder := png.Encoder{CompressionLevel: png.BestSpeed}
	return encoder.Encode(w, c.Image())
}

// SVG writes the picture as an SVG that asks for a sans font by several names.
func SVG(w io.Writer, o *outcome.Run) error {
	s := newScene(o)
	c := vgsvg.NewWith(vgsvg.UseWH(width, s.height()))
	s.draw(draw.New(c))
	var out bytes.Buffer
	if _, err := c.WriteTo(&out); err != nil {
		return err
	}
	// Only attributes hold a bare quote, so no text of the user is changed.
	const asked, wanted = `style="font-family:Liberation Sans;`, `style="font-family:'Liberation Sans',Arial,Helvetica,sans-serif;`
	_, err := w.Write(bytes.ReplaceAll(out.Bytes(), []byte(asked), []byte(wanted)))
	return err
}

// A scene is what is drawn and where.
type scene struct {
	*outcome.Run
	curves    []outcome.Curve
	styles    []draw.LineStyle
	left      int // nodes not drawn
	near, far []outcome.Line
	blocks    []block
	marks     []float64 // starts of legs [s]
	axes      axes
	legend    legend
}

func newScene(o *outcome.Run) *scene {
	s := &scene{Run: o}
	s.curves, s.left = o.Curves(buckets, curves)
	free := 0
	for i := range s.curves {
		style := draw.LineStyle{Color: heldInk, Width: 0.7}
		if !s.curves[i].Held {
			style = lineStyle(free)
			free++
		}
		s.styles = append(s.styles, style)
	}
	low, high, near, far := outcome.Range(s.curves, outcome.Lines(s.curves))
	s.near, s.far = near, far
	s.axes = newAxes(o.End, s.curves, low, high)
	s.blocks, s.marks = blocksOf(o)
	s.legend = newLegend(s)
	return s
}

// height grows with the legend.
func (s *scene) height() vg.Length { return max(height, s.legend.height()+100) }
