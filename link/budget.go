package link

import "slices"

// A Kind tells what a line of a budget stands for. It is wording, never arithmetic.
type Kind string

// The kinds of lines.
const (
	PowerLine     Kind = "power"
	GainLine      Kind = "gain"
	LossLine      Kind = "loss"
	NoiseLine     Kind = "noise"
	NeedLine      Kind = "need"
	AllowanceLine Kind = "allowance"
)

// A Line is one entry of a budget. DB is signed as it enters the sum: a power in dBm, gains
// positive, losses negative, the need as minus the level required.
type Line struct {
	Name   string
	DB     float64
	Kind   Kind
	Source string // "hallin.yaml:31", "P.526-15"
}

// A Budget is one direction of a link: lines in the order the signal takes, from the
// transmitter's power to what the receiver needs. They add up to MarginDB.
type Budget struct {
	From, To string
	FreqHz   float64
	Lines    []Line

	ReceivedDBm float64 // at the receiver's port
	RequiredDBm float64
	MarginDB    float64 // before the aim's margin is taken
	// TransmissionLossDB is the basic transmission loss for 50 % of time and locations.
	TransmissionLossDB float64
	FadeDB             float64
	// DepartureDeg and ArrivalDeg are the elevations of the path at From and at To.
	DepartureDeg, ArrivalDeg float64
	ChancePct                float64
	Warnings                 []Warning
	Remarks                  []Warning // how things were taken to be: nothing to act on
}

// A Warning is what a reader of a budget must know: a limit that was touched, at a station or,
// where At is empty, on the path.
type Warning struct{ At, Text string }

// String writes the warning with its place before it.
func (w Warning) String() string {
	if w.At == "" {
		return w.Text
	}
	return w.At + ": " + w.Text
}

func (b *Budget) add(kind Kind, name string, dB float64, source string) {
	b.Lines = append(b.Lines, Line{name, dB, kind, source})
}

// warn adds warnings of a place, each once.
func (b *Budget) warn(at string, texts ...string) {
	for _, text := range texts {
		b.Warnings = addWarning(b.Warnings, Warning{at, text})
	}
}

func addWarning(list []Warning, w Warning) []Warning {
	if slices.Contains(list, w) {
		return list
	}
	return append(list, w)
}

// close adds up the lines.
func (b *Budget) close() {
	b.ReceivedDBm, b.MarginDB = 0, 0
	for _, l := range b.Lines {
		b.MarginDB += l.DB
		switch l.Kind {
		case PowerLine, GainLine, LossLine:
			b.ReceivedDBm += l.DB
		case NeedLine:
			b.RequiredDBm = -l.DB
		}
	}
}
