package report

import (
	"bytes"
	"fmt"
	"image/color"
	"io"

	"fellreach/link/plan"

	"gonum.org/v1/plot"
	"gonum.org/v1/plot/plotter"
	"gonum.org/v1/plot/vg"
	"gonum.org/v1/plot/vg/draw"
	"gonum.org/v1/plot/vg/vgsvg"
)

// mostVSWR is the top of the curve's picture.
const mostVSWR = 6

// VSWRSVG draws the VSWR of an antenna over frequency, its lengths fixed, with the channel's edges
// and the limit of 2.
func VSWRSVG(w io.Writer, a *plan.AntennaResult) error {
	if len(a.Curve) == 0 {
		return fmt.Errorf("%s has no VSWR curve: a %s is described by its maker's figures", a.Name, a.Kind)
	}
	p := plot.New()
	p.Title.Text = fmt.Sprintf("%s: VSWR against %g ohm%s", a.Name, a.ReferenceOhm, a.Where)
	p.X.Label.Text, p.Y.Label.Text = "MHz", "VSWR"
	p.Y.Min, p.Y.Max = 1, mostVSWR
	points := make(plotter.XYs, len(a.Curve))
	for i, c := range a.Curve {
		points[i] = plotter.XY{X: c.FreqHz / 1e6, Y: min(c.VSWR, mostVSWR)}
	}
	curve, err := plotter.NewLine(points)
	if err != nil {
		return err
	}
	curve.Width, curve.Color = vg.Points(2), color.RGBA{0x1d, 0x3a, 0x4f, 0xff}
	p.Add(plotter.NewGrid(), curve)
	amber, dash := color.RGBA{0xc9, 0x8a, 0x2b, 0xff}, []vg.Length{vg.Points(5), vg.Points(3)}
	rules := []plotter.XYs{{{X: points[0].X, Y: 2}, {X: points[len(points)-1].X, Y: 2}}}
	for _, edge := range a.Channel {
		if edge > 0 {
			rules = append(rules, plotter.XYs{{X: edge / 1e6, Y: 1}, {X: edge / 1e6, Y: mostVSWR}})
		}
	}
	for _, rule := range rules {
		l, err := plotter.NewLine(rule)
		if err != nil {
			return err
		}
		l.Color, l.Dashes = amber, dash
		p.Add(l)
	}
	canvas := vgsvg.New(18*vg.Centimeter, 9*vg.Centimeter)
	p.Draw(draw.New(canvas))
	var b bytes.Buffer
	if _, err := canvas.WriteTo(&b); err != nil {
		return err
	}
	_, err = w.Write(b.Bytes())
	return err
}
