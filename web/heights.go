package web

import (
	"context"
	"fmt"
	"math"
	"runtime"

	"fellreach/link"
	"fellreach/link/plan"

	"github.com/danielgtaylor/huma/v2"
	"golang.org/x/sync/errgroup"
)

// maxHeightCells bounds the cells of one table.
const maxHeightCells = 600

// A heightsInput asks what a station's links do with other antennas at other heights.
type heightsInput struct {
	Versioned
	Station  string   `query:"station" required:"true" maxLength:"500" example:"Gauge 3"`
	FromM    float64  `query:"from_m" required:"true" minimum:"0.1" maximum:"1000" example:"4" doc:"lowest height of the antenna above ground"`
	ToM      float64  `query:"to_m" required:"true" minimum:"0.1" maximum:"1000" example:"10" doc:"greatest height, included"`
	StepM    float64  `query:"step_m" required:"true" minimum:"0.1" maximum:"1000" example:"2"`
	Antennas []string `query:"antennas" required:"true" minItems:"1" maxItems:"30" example:"rod,beam" doc:"by their names in the plan, with commas between"`
}

// Heights is a station's height x antenna table.
type Heights struct {
	Site  string       `json:"site" doc:"the station"`
	Cells []HeightCell `json:"cells" doc:"antenna by antenna, heights growing"`
}

// A HeightCell is the worst of the station's links at one height with one antenna.
type HeightCell struct {
	HeightM   float64      `json:"height_m"`
	Antenna   string       `json:"antenna"`
	MarginDB  float64      `json:"margin_db"`
	Verdict   link.Verdict `json:"verdict" enum:"closes,thin,fails"`
	WorstLink string       `json:"worst_link"`
}

func (s *Server) registerHeights(api huma.API) {
	answer(api, readOperation("readHeights", "/api/heights", "A station's links over the height of its antenna, for several antennas; mast and feeder grow along"), s.readHeights)
}

func (s *Server) readHeights(ctx context.Context, in *heightsInput) (Heights, error) {
	v, err := s.shelf.take(in.Version)
	if err != nil {
		return Heights{}, err
	}
	defer s.shelf.release(v)
	network, err := v.alone()
	if err != nil {
		return Heights{}, err
	}
	station := network.Stations[in.Station]
	if station == nil {
		return Heights{}, fmt.Errorf("there is no station %.60q", in.Station)
	}
	if in.ToM < in.FromM {
		return Heights{}, fmt.Errorf("the heights from %g m to %g m run downwards", in.FromM, in.ToM)
	}
	const slack = 1e-9
	rows := int(math.Floor((in.ToM-in.FromM)/in.StepM+slack)) + 1
	if rows*len(in.Antennas) > maxHeightCells {
		return Heights{}, fmt.Errorf("%d heights of %d antennas are over %d cells: take a larger step", rows, len(in.Antennas), maxHeightCells)
	}
	out := Heights{in.Station, make([]HeightCell, rows*len(in.Antennas))}
	work, inner := errgroup.WithContext(ctx)
	work.SetLimit(runtime.GOMAXPROCS(0))
	for i := range out.Cells {
		work.Go(func() (err error) {
			if err = inner.Err(); err == nil {
				out.Cells[i], err = heightCell(network, station, in.Antennas[i/rows], in.FromM+float64(i%rows)*in.StepM)
			}
			return err
		})
	}
	return out, work.Wait()
}

// heightCell computes the links of a station with another antenna at another height.
func heightCell(n *plan.Network, station *link.Station, antenna string, heightM float64) (HeightCell, error) {
	cell := HeightCell{HeightM: heightM, Antenna: antenna, MarginDB: math.Inf(1), Verdict: link.Closes}
	refitted, err := n.Refitted(station, antenna, heightM)
	if err != nil {
		return cell, err
	}
	for _, l := range n.Links {
		changed := *l
		switch station {
		case l.From:
			changed.From = refitted
		case l.To:
			changed.To = refitted
		default:
			continue
		}
		result, err := n.Compute(&changed)
		if err != nil {
			return cell, fmt.Errorf("%s at %g m: %w", antenna, heightM, err)
		}
		if result.MarginDB < cell.MarginDB {
			cell.MarginDB, cell.WorstLink = result.MarginDB, l.Title()
		}
		cell.Verdict = worse(cell.Verdict, result.Verdict)
	}
	if cell.WorstLink == "" {
		return cell, fmt.Errorf("%q has no link to weigh", station.Name)
	}
	return cell, nil
}

// worse returns the lesser of two verdicts.
func worse(a, b link.Verdict) link.Verdict {
	for _, v := range []link.Verdict{link.Fails, link.Thin} {
		if a == v || b == v {
			return v
		}
	}
	return link.Closes
}
