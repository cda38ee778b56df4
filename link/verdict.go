package link

// A Verdict says whether a link does what its aim asks.
type Verdict string

// The verdicts, best first.
const (
	Closes Verdict = "closes" // the aim is met in both directions
	Thin   Verdict = "thin"   // the link works, with less than the aim
	Fails  Verdict = "fails"  // the margin is below zero
)

// Mark returns the sign that goes with the verdict wherever it is shown.
func (v Verdict) Mark() string {
	switch v {
	case Closes:
		return "●"
	case Thin:
		return "◐"
	}
	return "○"
}

// judge returns the verdict on a margin in dB and a chance in percent.
func (a Aim) judge(marginDB, chancePct float64) Verdict {
	switch {
	case marginDB < 0:
		return Fails
	case a.ChancePct > 0 && chancePct >= a.ChancePct, a.ChancePct == 0 && marginDB >= a.MarginDB:
		return Closes
	}
	return Thin
}
