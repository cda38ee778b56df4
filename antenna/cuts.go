package antenna

import (
	"errors"
	"fmt"
	"io"
	"math"
	"slices"
)

// Cuts joins a maker's two cuts through the main lobe to a pattern over the sphere. Each is a CSV
// file with the header angle_deg,gain_db, in any order and in steps of at most 30 degrees:
//
//   - horizontal: azimuth clockwise around the circle, -180 to 360, 0 the facing;
//   - vertical: elevation in the plane of the facing, around the circle over the zenith (90) and
//     the rear (180), -180 to 360, or the front half alone, -90 to 90.
//
// The values may be relative or in dBi: of each cut the largest counts as the stated gain, and
// what lies more than 100 dB under it as 100 dB. Errors about the content wrap a [*FileError].
//
// The horizontal cut is taken to pass through the vertical cut's maximum, at elevation e0 (within
// 45 degrees of the horizontal; the one nearest to it if there are several). With AH and AV the
// cuts' attenuations in dB, az and el the direction, the attenuation is
//
//	V(el)  = w AV(el) + (1 - w) AV(180 - el),  w = (1 + cos az)/2
//	A      = V(el) + c(el) [AH(az) - V(e0)],   not below 0
//
// where c falls as a cosine from 1 at e0 to 0 at the zenith and the nadir: the vertical cut,
// turning from its front into its rear half as az goes round, corrected to agree with the
// horizontal one. This is continuous over the sphere, gives the horizontal cut exactly, and the
// vertical one too if the cuts agree where they cross, in front and behind; a note says by how
// much they do not. A vertical cut of the front half alone is mirrored to the rear. The rule is
// ours. The polarization is that of the mount.
func Cuts(horizontal, vertical io.Reader, gainDBi float64, port Port) (Design, error) {
	port, err := port.checked()
	if err := errors.Join(checkGain(gainDBi), err); err != nil {
		return Design{}, err
	}
	h, err := readCut(horizontal)
	if err != nil {
		return Design{}, fmt.Errorf("horizontal cut: %w", err)
	}
	v, err := readCut(vertical)
	if err != nil {
		return Design{}, fmt.Errorf("vertical cut: %w", err)
	}
	joined, err := join(h, v)
	if err != nil {
		return Design{}, err
	}
	antenna := stated{
		pattern: gainPattern(gainDBi, joined.attenuationDB),
		port:    port,
		source:  fmt.Sprintf("%g dBi as stated, two cuts joined over the sphere", gainDBi),
	}
	antenna.notes = append(joined.notes(), excessNotes(antenna.pattern)...)
	return Design{Kind: "cuts", Directional: true, Solve: antenna.solve}, nil
}

// A cut holds attenuations in dB, the least of them 0, at ascending angles: around the circle
// with the first repeated 360 degrees on, or from -90 to 90 alone.
type cut struct{ deg, dB []float64 }

// halfCircle tells whether the cut is of the front half alone.
func (c cut) halfCircle() bool { return c.deg[len(c.deg)-1]-c.deg[0] == 180 }

// at returns the attenuation at an angle, interpolated in dB.
func (c cut) at(deg float64) float64 {
	if !c.halfCircle() {
		deg -= 360 * math.Floor((deg-c.deg[0])/360)
	}
	i, x := between(c.deg, deg)
	return c.dB[i]*(1-x) + c.dB[i+1]*x
}

func readCut(r io.Reader) (cut, error) {
	_, rows, err := readRows(r, "angle_deg,gain_db")
	if err != nil {
		return cut{}, err
	}
	gains := make(map[float64]row, len(rows))
	front, peak := true, math.Inf(-1)
	for _, r := range rows {
		deg, gain := r.values[0], r.values[1]
		if deg < -180 || deg > 360 {
			return cut{}, fileErrorf(r.line, "angle %g is out of range: -180 to 360 is allowed", deg)
		}
		if math.Abs(gain) > 1000 {
			return cut{}, fileErrorf(r.line, "gain %g dB is out of range: -1000 to 1000 is allowed", gain)
		}
		first, again := gains[circleDeg(deg)]
		if again && (first.values[0] == deg || first.values[1] != gain) {
			return cut{}, fileErrorf(r.line, "angle %g is in line %d already", deg, first.line)
		}
		if !again { // else the circle is closed
			gains[circleDeg(deg)] = r
		}
		front = front && math.Abs(deg) <= 90
		peak = max(peak, gain)
	}
	return newCut(gains, front, peak)
}

// newCut orders and normalizes the rows of a cut, keyed by their angle within the circle.
func newCut(gains map[float64]row, front bool, peak float64) (cut, error) {
	var c cut
	for deg := range gains {
		if front && deg > 180 {
			deg -= 360
		}
		c.deg = append(c.deg, deg)
	}
	slices.Sort(c.deg)
	if !front {
		c.deg = append(c.deg, c.deg[0]+360)
	} else if c.deg[0] != -90 || c.deg[len(c.deg)-1] != 90 {
		return cut{}, fileErrorf(0, "angles run from %g to %g: the whole circle is needed, or -90 to 90", c.deg[0], c.deg[len(c.deg)-1])
	}
	for _, deg := range c.deg {
		c.dB = append(c.dB, min(peak-gains[circleDeg(deg)].values[1], -lowestFileDBi))
	}
	return c, checkGaps("angle", c.deg)
}

// joinedCuts are two cuts and the elevation at which they cross.
type joinedCuts struct {
	h, v    cut
	peakDeg float64
}

func join(h, v cut) (joinedCuts, error) {
	if h.halfCircle() {
		return joinedCuts{}, fmt.Errorf("horizontal cut: %w", fileErrorf(0, "angles run from -90 to 90: the whole circle is needed"))
	}
	const steepest = 45
	peak := math.Inf(1)
	for i, deg := range v.deg {
		deg = math.Remainder(deg, 360)
		if v.dB[i] == 0 && math.Abs(deg) < math.Abs(peak) {
			peak = deg
		}
	}
	if math.Abs(peak) > steepest {
		return joinedCuts{}, fmt.Errorf("vertical cut: %w", fileErrorf(0, "its maximum is at elevation %g: it must lie within %d degrees of the horizontal, in front", peak, steepest))
	}
	return joinedCuts{h, v, peak}, nil
}

func (j joinedCuts) attenuationDB(d Direction) float64 {
	correction := j.h.at(d.AzDeg) - j.blended(d.AzDeg, j.peakDeg)
	return max(0, j.blended(d.AzDeg, d.ElDeg)+j.taper(d.ElDeg)*correction)
}

// blended returns V: the vertical cut, part front and part rear by azimuth.
func (j joinedCuts) blended(azDeg, elDeg float64) float64 {
	if j.v.halfCircle() {
		return j.v.at(elDeg)
	}
	w := (1 + math.Cos(radians(azDeg))) / 2
	return w*j.v.at(elDeg) + (1-w)*j.v.at(180-elDeg)
}

// taper returns c: 1 at the crossing, 0 at the zenith and the nadir.
func (j joinedCuts) taper(elDeg float64) float64 {
	reach := 90 - j.peakDeg
	if elDeg < j.peakDeg {
		reach = 90 + j.peakDeg
	}
	return math.Cos((elDeg - j.peakDeg) / reach * math.Pi / 2)
}

// notes says where the cuts disagree at their crossings by more than reading a plot explains.
func (j joinedCuts) notes() []string {
	const explainedDB = 1
	var notes []string
	compare := func(azDeg float64, place string) {
		byDB := math.Abs(j.h.at(azDeg) - j.blended(azDeg, j.peakDeg))
		if byDB > explainedDB {
			notes = append(notes, fmt.Sprintf("the cuts differ by %.1f dB where they cross %s: the horizontal one is taken there", byDB, place))
		}
	}
	compare(0, "in front")
	if !j.v.halfCircle() {
		compare(180, "behind")
	}
	return notes
}
