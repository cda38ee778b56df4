package antenna

import (
	"io"
	"maps"
	"math"
	"slices"
)

// The headers of a pattern table.
const (
	headerOneGain  = "azimuth_deg,elevation_deg,gain_dbi"
	headerTwoGains = "azimuth_deg,elevation_deg,gain_v_dbi,gain_h_dbi"
)

// Table reads an antenna's gain over the whole sphere from a CSV file with the header
//
//	azimuth_deg,elevation_deg,gain_v_dbi,gain_h_dbi
//	azimuth_deg,elevation_deg,gain_dbi
//
// one row for each pair of its azimuths (-180 to 360, around the circle, clockwise seen from
// above; 0 is the facing) and elevations (-90 to 90, both included), in any order, in steps of at
// most 30 degrees. Gains are interpolated in dB between the four directions around. They may not
// exceed 40 dBi, and those below -100 dBi, however a null was written, are read as -100 dBi.
//
// With two gains (vertical and horizontal component, of the antenna upright) the mount's roll
// turns the pattern; the phase between them is unknown and taken as zero. With one gain the roll
// gives the polarization and the pattern is as mounted.
//
// Errors about the content are a [*FileError].
func Table(r io.Reader, port Port) (Design, error) {
	port, err := port.checked()
	if err != nil {
		return Design{}, err
	}
	header, rows, err := readRows(r, headerTwoGains, headerOneGain)
	if err != nil {
		return Design{}, err
	}
	grid, err := newGrid(rows)
	if err != nil {
		return Design{}, err
	}
	antenna := stated{
		pattern: grid.pattern(),
		port:    port,
		source:  "gain from a table, interpolated in dB",
	}
	if err := checkGain(antenna.pattern.PeakDBi); err != nil {
		return Design{}, fileErrorf(0, "largest %v", err)
	}
	antenna.notes = excessNotes(antenna.pattern)
	if header == headerTwoGains {
		antenna.notes = append(antenna.notes, "the table has no phase between its polarizations: taken as zero")
	}
	return Design{Kind: "table", Directional: true, Solve: antenna.solve}, nil
}

// A grid holds gains at all pairs of ascending angles. Its azimuths run from the smallest within
// [0, 360) to that plus 360, which repeats it.
type grid struct {
	azDeg, elDeg []float64
	gainDBi      [][]float64 // for each column of gain, by elevation and azimuth
}

// newGrid lays out rows of azimuth, elevation and gains.
func newGrid(rows []row) (grid, error) {
	placed := make(map[Direction]row, len(rows))
	azimuths, elevations := map[float64]bool{}, map[float64]bool{}
	for _, r := range rows {
		az, el := r.values[0], r.values[1]
		if err := r.check(); err != nil {
			return grid{}, err
		}
		at := Direction{circleDeg(az), el}
		first, again := placed[at]
		if again && (first.values[0] == az || !slices.Equal(first.values[2:], r.values[2:])) {
			return grid{}, fileErrorf(r.line, "azimuth %g elevation %g is in line %d already", az, el, first.line)
		}
		if !again { // else the circle is closed
			placed[at] = r
		}
		azimuths[at.AzDeg], elevations[el] = true, true
	}
	g := grid{
		azDeg: slices.Sorted(maps.Keys(azimuths)),
		elDeg: slices.Sorted(maps.Keys(elevations)),
	}
	g.azDeg = append(g.azDeg, g.azDeg[0]+360)
	if err := g.checkCover(); err != nil {
		return grid{}, err
	}
	return g, g.fill(placed)
}

// check returns an error unless the row is a direction and gains; it clips the gains from below.
func (r row) check() error {
	if az := r.values[0]; az < -180 || az > 360 {
		return fileErrorf(r.line, "azimuth %g is out of range: -180 to 360 is allowed", az)
	}
	if el := r.values[1]; el < -90 || el > 90 {
		return fileErrorf(r.line, "elevation %g is out of range: -90 to 90 is allowed", el)
	}
	for i, gain := range r.values[2:] {
		if gain > highestDBi {
			return fileErrorf(r.line, "gain %g dBi is out of range: at most %d is allowed", gain, highestDBi)
		}
		r.values[2+i] = max(gain, lowestFileDBi)
	}
	return nil
}

func (g grid) checkCover() error {
	if first, last := g.elDeg[0], g.elDeg[len(g.elDeg)-1]; first != -90 || last != 90 {
		return fileErrorf(0, "elevations run from %g to %g: the whole sphere is needed, from -90 to 90", first, last)
	}
	if err := checkGaps("elevation", g.elDeg); err != nil {
		return err
	}
	return checkGaps("azimuth", g.azDeg)
}

// fill takes the gains from the rows, of which none may be missing. The grid is allocated only
// once it is known to be no larger than the file.
func (g *grid) fill(placed map[Direction]row) error {
	for _, el := range g.elDeg {
		for _, az := range g.azDeg {
			if _, ok := placed[Direction{circleDeg(az), el}]; !ok {
				return fileErrorf(0, "no row for azimuth %g elevation %g: all pairs of azimuths and elevations are needed", az, el)
			}
		}
	}
	columns := len(placed[Direction{circleDeg(g.azDeg[0]), g.elDeg[0]}].values) - 2
	for column := range columns {
		gains := make([]float64, 0, len(g.elDeg)*len(g.azDeg))
		for _, el := range g.elDeg {
			for _, az := range g.azDeg {
				gains = append(gains, placed[Direction{circleDeg(az), el}].values[2+column])
			}
		}
		g.gainDBi = append(g.gainDBi, gains)
	}
	return nil
}

// pattern returns the grid as a pattern. Its peak is at one of its points: along every grid line
// between them the power is a sum of exponentials, which has no maximum inside.
func (g grid) pattern() Pattern {
	peak := 0.0
	for i := range g.gainDBi[0] {
		power := 0.0
		for _, column := range g.gainDBi {
			power += powerRatio(column[i])
		}
		peak = max(peak, power)
	}
	p := Pattern{PeakDBi: decibels(peak), GainOnly: len(g.gainDBi) == 1}
	p.Field = func(d Direction) Field {
		f := Field{Theta: g.amplitude(0, d)}
		if len(g.gainDBi) == 2 {
			f.Phi = g.amplitude(1, d)
		}
		return f
	}
	return p
}

// amplitude returns the amplitude of one column towards a direction, bilinear in dB.
func (g grid) amplitude(column int, d Direction) complex128 {
	az := d.AzDeg - 360*math.Floor((d.AzDeg-g.azDeg[0])/360)
	i, x := between(g.azDeg, az)
	j, y := between(g.elDeg, d.ElDeg)
	gains, width := g.gainDBi[column], len(g.azDeg)
	lower := gains[j*width+i]*(1-x) + gains[j*width+i+1]*x
	upper := gains[(j+1)*width+i]*(1-x) + gains[(j+1)*width+i+1]*x
	return complex(amplitude(lower*(1-y)+upper*y), 0)
}
