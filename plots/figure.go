package plots

import (
	"bytes"
	"errors"
	"fmt"
	"io"

	"gonum.org/v1/plot/vg"
	"gonum.org/v1/plot/vg/vgimg"
	"gonum.org/v1/plot/vg/vgpdf"
	"gonum.org/v1/plot/vg/vgsvg"
)

// Figure is a finished drawing, ready to be written any number of times, in any format.
type Figure struct {
	title, desc string
	w, h        float64 // pt
	paint       func(*pad)
}

// pngDPI is the resolution of PNG files: a hairline of 0.4 pt is one pixel wide.
const pngDPI = 192

// Formats lists what Write accepts.
func Formats() []string { return []string{"svg", "png", "pdf"} }

// newFigure checks the texts that every figure must have. A description is for those
// who cannot see the figure: it says what the figure shows and its main numbers.
func newFigure(title, desc string, w, h float64, paint func(*pad)) (*Figure, error) {
	if clean(title) == "" || clean(desc) == "" {
		return nil, errors.New("a figure wants a title and a description")
	}
	return &Figure{title: clean(title), desc: clean(desc), w: w, h: h, paint: paint}, nil
}

// Title is what the figure is headed with.
func (f *Figure) Title() string { return f.title }

// Size is the width and height of the sheet, pt (1/72 inch).
func (f *Figure) Size() (w, h float64) { return f.w, f.h }

// Write draws the figure as "svg", "png" or "pdf". Nothing is written if it fails:
// a panic of the plot library is returned as an error.
func (f *Figure) Write(w io.Writer, format string) error {
	data, err := f.render(format)
	if err != nil {
		return fmt.Errorf("figure %q: %w", f.title, err)
	}
	_, err = w.Write(data)
	return err
}

func (f *Figure) render(format string) (data []byte, err error) {
	defer func() {
		if r := recover(); r != nil {
			data, err = nil, fmt.Errorf("drawing failed: %v", r)
		}
	}()
	w, h := vg.Length(f.w), vg.Length(f.h)
	var buf bytes.Buffer
	switch format {
	case "svg":
		c := vgsvg.New(w, h)
		f.draw(&pad{canvas: c, kind: onSVG})
		if _, err := c.WriteTo(&buf); err != nil {
			return nil, err
		}
		return finishSVG(buf.Bytes(), f.title, f.desc)
	case "png":
		c := vgimg.NewWith(vgimg.UseWH(w, h), vgimg.UseDPI(pngDPI), vgimg.UseBackgroundColor(paperColour()))
		f.draw(&pad{canvas: c, kind: onPNG})
		_, err = vgimg.PngCanvas{Canvas: c}.WriteTo(&buf)
	case "pdf":
		c := vgpdf.New(w, h)
		f.draw(&pad{canvas: c, kind: onPDF})
		_, err = c.WriteTo(&buf)
	default:
		return nil, fmt.Errorf("no such format: %q (svg, png, pdf)", format)
	}
	return buf.Bytes(), err
}

func (f *Figure) draw(p *pad) {
	p.fillRect(vg.Rectangle{Max: xy(f.w, f.h)}, inkPaper)
	f.paint(p)
}
