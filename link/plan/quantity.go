package plan

import (
	"math"

	"github.com/invopop/jsonschema"
)

// A Quantity is a number in one canonical unit that a plan or a flag writes as text with a unit
// of its dimension.
type Quantity[D dimension] float64

// The quantities of a plan, with their canonical units.
type (
	Frequency   = Quantity[frequency]   // Hz, above 0
	Length      = Quantity[length]      // m, above 0
	Distance    = Quantity[distance]    // m, 0 or more
	Elevation   = Quantity[elevation]   // m, any sign
	Power       = Quantity[power]       // dBm
	Level       = Quantity[level]       // dBm
	Decibels    = Quantity[decibels]    // dB, any sign
	Loss        = Quantity[loss]        // dB, 0 or more
	Gain        = Quantity[gain]        // dBi
	Percent     = Quantity[percent]     // %, 0 or more
	Angle       = Quantity[angle]       // degrees
	Resistance  = Quantity[resistance]  // ohm, above 0
	Attenuation = Quantity[attenuation] // dB/m, above 0
	Ratio       = Quantity[ratio]       // impedance ratio to 1, above 0
)

// A dimension is a kind of quantity: how it is written.
type dimension interface{ written() *notation }

type (
	frequency   struct{}
	length      struct{}
	distance    struct{}
	elevation   struct{}
	power       struct{}
	level       struct{}
	decibels    struct{}
	loss        struct{}
	gain        struct{}
	percent     struct{}
	angle       struct{}
	resistance  struct{}
	attenuation struct{}
	ratio       struct{}
)

func (frequency) written() *notation   { return frequencies }
func (length) written() *notation      { return lengths }
func (distance) written() *notation    { return distances }
func (elevation) written() *notation   { return elevations }
func (power) written() *notation       { return powers }
func (level) written() *notation       { return levels }
func (decibels) written() *notation    { return anyDecibels }
func (loss) written() *notation        { return losses }
func (gain) written() *notation        { return gains }
func (percent) written() *notation     { return percents }
func (angle) written() *notation       { return angles }
func (resistance) written() *notation  { return resistances }
func (attenuation) written() *notation { return attenuations }
func (ratio) written() *notation       { return ratios }

// dBdInDBi is the directivity of a half-wave dipole with a sinusoidal current: 1.641, 2.15 dB.
const dBdInDBi = 2.15

var (
	metric   = []unit{{"mm", times(1e-3)}, {"cm", times(1e-2)}, {"m", times(1)}, {"km", times(1e3)}}
	watts    = form{positiveNumber, []unit{{"mW", dBmOfWatts(1e-3)}, {"W", dBmOfWatts(1)}, {"kW", dBmOfWatts(1e3)}}}
	dBm      = form{anyNumber, []unit{{"dBm", times(1)}}}
	inWaves  = []unit{{"wl", times(1)}}
	decibel  = []unit{{"dB", times(1)}}
	lineLoss = []unit{{"dB/100m", times(1e-2)}, {"dB/m", times(1)}, {"dB/km", times(1e-3)}}
	hertz    = []unit{{"Hz", times(1)}, {"kHz", times(1e3)}, {"MHz", times(1e6)}, {"GHz", times(1e9)}}
	overIso  = []unit{{"dBi", times(1)}, {"dBd", func(x float64) float64 { return x + dBdInDBi }}}

	frequencies  = newNotation("a frequency", "151.5 MHz", form{positiveNumber, hertz})
	lengths      = newNotation("a length above zero", "12 m", form{positiveNumber, metric})
	distances    = newNotation("a length, zero or more,", "50 m", form{notNegative, metric})
	elevations   = newNotation("a height or place along an axis", "132.4 m", form{anyNumber, metric})
	powers       = newNotation("a power", "37 dBm", watts, dBm)
	levels       = newNotation("a level", "-117 dBm", dBm)
	anyDecibels  = newNotation("a value", "6 dB", form{anyNumber, decibel})
	losses       = newNotation("a loss, zero or more,", "0.3 dB", form{notNegative, decibel})
	gains        = newNotation("an antenna gain", "6 dBi", form{anyNumber, overIso})
	percents     = newNotation("a percentage", "99 %", form{notNegative, []unit{{"%", times(1)}}})
	angles       = newNotation("an angle", "12.5 deg", form{anyNumber, []unit{{"deg", times(1)}}})
	resistances  = newNotation("an impedance", "50 ohm", form{positiveNumber, []unit{{"ohm", times(1)}}})
	attenuations = newNotation("a line loss", "2.2 dB/100m", form{positiveNumber, lineLoss})
	ratios       = newNotation("an impedance ratio", "4:1", form{positiveNumber, []unit{{":1", times(1)}}})
	spans        = newNotation("a length", "0.85 wl", form{positiveNumber, metric}, form{positiveNumber, inWaves})
	offsets      = newNotation("a place along an axis", "-0.4 m", form{anyNumber, metric}, form{anyNumber, inWaves})
)

func times(factor float64) func(float64) float64 {
	return func(x float64) float64 { return x * factor }
}

func dBmOfWatts(watts float64) func(float64) float64 {
	return func(x float64) float64 { return 10 * math.Log10(x*watts*1000) }
}

// Set reads a quantity as a plan writes it. The error names the units that are allowed.
func (q *Quantity[D]) Set(text string) error {
	var d D
	v, _, err := d.written().parse(text)
	if err == nil {
		*q = Quantity[D](v)
	}
	return err
}

func (Quantity[D]) describe() string {
	var d D
	return d.written().describe()
}

// JSONSchema gives the pattern of the texts that Set accepts.
func (Quantity[D]) JSONSchema() *jsonschema.Schema {
	var d D
	return d.written().schema()
}

// A Span is a length above zero in metres or in wavelengths; one of the two is zero.
type Span struct{ M, Wavelengths float64 }

// Set reads "0.982 m" or "0.85 wl".
func (s *Span) Set(text string) error { return setSpan(s, spans, text) }

func (Span) describe() string { return spans.describe() }

// JSONSchema gives the pattern of the texts that Set accepts.
func (Span) JSONSchema() *jsonschema.Schema { return spans.schema() }

// An Offset is a place along an axis in metres or in wavelengths, of any sign.
type Offset Span

// Set reads "-0.4 m" or "0.25 wl".
func (o *Offset) Set(text string) error { return setSpan((*Span)(o), offsets, text) }

func (Offset) describe() string { return offsets.describe() }

// JSONSchema gives the pattern of the texts that Set accepts.
func (Offset) JSONSchema() *jsonschema.Schema { return offsets.schema() }

func setSpan(s *Span, n *notation, text string) error {
	v, unit, err := n.parse(text)
	switch {
	case err != nil:
		return err
	case unit == "wl":
		*s = Span{Wavelengths: v}
	default:
		*s = Span{M: v}
	}
	return nil
}
