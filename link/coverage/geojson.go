package coverage

import (
	"bufio"
	"encoding/json"
	"fmt"
	"io"
	"strconv"

	"fellreach/terrain/raster"

	"github.com/paulmach/orb"
	"github.com/paulmach/orb/simplify"
)

// writeBands writes the patches of a map as GeoJSON (RFC 7946): one feature for each band that has
// any, with its range and area, coordinates to 1e-6 degrees (0.1 m). Outlines may leave the sides of
// the cells by smoothCells cells.
func writeBands(w io.Writer, name string, f *raster.Frame, patches []patch, bands []Band, smoothCells float64) error {
	out := bufio.NewWriterSize(w, 1<<16)
	title, err := json.Marshal(name)
	if err != nil {
		return err
	}
	fmt.Fprintf(out, `{"type":"FeatureCollection","name":%s,"features":[`, title)
	first := true
	for k, band := range bands {
		properties, err := json.Marshal(struct {
			Site string `json:"site"`
			Band
		}{name, band})
		if err != nil {
			return err
		}
		if !hasClass(patches, uint8(k+1)) {
			continue
		}
		if !first {
			out.WriteByte(',')
		}
		first = false
		fmt.Fprintf(out, "\n"+`{"type":"Feature","properties":%s,"geometry":{"type":"MultiPolygon","coordinates":[`, properties)
		if err := writePolygons(out, f, patches, uint8(k+1), smoothCells); err != nil {
			return err
		}
		out.WriteString("]}}")
	}
	out.WriteString("\n]}\n")
	return out.Flush()
}

func hasClass(patches []patch, class uint8) bool {
	for i := range patches {
		if patches[i].class == class {
			return true
		}
	}
	return false
}

func writePolygons(out *bufio.Writer, f *raster.Frame, patches []patch, class uint8, smoothCells float64) error {
	first := true
	for i := range patches {
		if patches[i].class != class {
			continue
		}
		if !first {
			out.WriteByte(',')
		}
		first = false
		out.WriteByte('[')
		for k, ring := range patches[i].rings {
			if k > 0 {
				out.WriteByte(',')
			}
			if err := writeRing(out, f, smoothed(ring, smoothCells)); err != nil {
				return err
			}
		}
		out.WriteByte(']')
	}
	return nil
}

// smoothed is a ring as places of the frame, its first repeated at its end, simplified by Douglas and
// Peucker's method where a tolerance is given. A ring that would vanish keeps its cells.
func smoothed(ring []corner, cells float64) orb.Ring {
	places := make(orb.Ring, len(ring)+1)
	for i, c := range ring {
		places[i] = orb.Point{float64(c.col), float64(c.row)}
	}
	places[len(ring)] = places[0]
	if cells == 0 {
		return places
	}
	const least = 4 // places of a ring
	if simple := simplify.DouglasPeucker(cells).Ring(places.Clone()); len(simple) >= least {
		return simple
	}
	return places
}

// writeRing writes a ring in longitude and latitude.
func writeRing(out *bufio.Writer, f *raster.Frame, places orb.Ring) error {
	if err := f.Places(places); err != nil {
		return err
	}
	var number []byte
	for i, p := range places {
		number = append(number[:0], "["...)
		if i == 0 {
			number = append(number[:0], "[["...)
		}
		number = strconv.AppendFloat(number, p[0], 'f', 6, 64)
		number = append(number, ',')
		number = strconv.AppendFloat(number, p[1], 'f', 6, 64)
		number = append(number, "],"...)
		if i == len(places)-1 {
			number = append(number[:len(number)-1], ']')
		}
		out.Write(number)
	}
	return nil
}
