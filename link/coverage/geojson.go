package coverage

import (
	"bufio"
	"encoding/json"
	"fmt"
	"io"
	"strconv"

	"fellreach/terrain/raster"

	"github.com/paulmach/orb"
)

// writeBands writes the patches of a map as GeoJSON (RFC 7946): one feature for each band that has
// any, with its range and area, coordinates to 1e-6 degrees (0.1 m).
func writeBands(w io.Writer, name string, f *raster.Frame, patches []patch, bands []Band) error {
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
		if err := writePolygons(out, f, patches, uint8(k+1)); err != nil {
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

func writePolygons(out *bufio.Writer, f *raster.Frame, patches []patch, class uint8) error {
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
			if err := writeRing(out, f, ring); err != nil {
				return err
			}
		}
		out.WriteByte(']')
	}
	return nil
}

// writeRing writes a ring in longitude and latitude, its first place repeated at its end.
func writeRing(out *bufio.Writer, f *raster.Frame, ring []corner) error {
	places := make([]orb.Point, len(ring)+1)
	for i, c := range ring {
		places[i] = orb.Point{float64(c.col), float64(c.row)}
	}
	places[len(ring)] = places[0]
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
