package report

import (
	"fmt"
	"io"
	"math"
	"strings"

	"fellreach/antenna"
	"fellreach/link/plan"

	"github.com/jedib0t/go-pretty/v6/table"
)

// Antenna is an antenna as installed, as JSON holds it: in full precision, gains with the conductors'
// loss and without mismatch, the pattern's azimuth 0 the facing, exact nulls as -100 dBi.
type Antenna struct {
	Name           string        `json:"name"`
	Kind           string        `json:"kind"`
	FrequencyHz    float64       `json:"frequency_hz"`
	ImpedanceOhm   ohmJSON       `json:"impedance_ohm"`
	VSWR           vswrJSON      `json:"vswr"`
	DirectivityDBi float64       `json:"directivity_dbi"`
	GainDBi        float64       `json:"gain_dbi"`
	Efficiency     float64       `json:"efficiency"`
	ResonantHz     *float64      `json:"resonant_hz"`
	BandHz         *[2]float64   `json:"band_vswr2_hz"`
	HzPerMM        *float64      `json:"resonance_shift_hz_per_mm"`
	Cut            []cutJSON     `json:"cut"`
	Segments       int           `json:"segments"`
	PowerBalance   *float64      `json:"power_balance"`
	Refined        *refinedJSON  `json:"refined,omitempty"`
	Source         string        `json:"source"`
	Warnings       []string      `json:"warnings"`
	Notes          []string      `json:"notes"`
	Toward         *towardJSON   `json:"toward,omitempty"`
	Pattern        []patternJSON `json:"pattern"`
}

type ohmJSON struct {
	R float64 `json:"r"`
	X float64 `json:"x"`
}

type vswrJSON struct {
	Value        float64 `json:"value"`
	ReferenceOhm float64 `json:"reference_ohm"`
}

type cutJSON struct {
	Part    string  `json:"part"`
	LengthM float64 `json:"length_m"`
}

type refinedJSON struct {
	Segments      int     `json:"segments"`
	ImpedanceOhm  ohmJSON `json:"impedance_ohm"`
	DirectivityDB float64 `json:"directivity_change_db"`
}

type towardJSON struct {
	AzimuthDeg   float64 `json:"azimuth_deg"`
	ElevationDeg float64 `json:"elevation_deg"`
	GainDBi      float64 `json:"gain_dbi"`
	GainVDBi     float64 `json:"gain_v_dbi"`
	GainHDBi     float64 `json:"gain_h_dbi"`
}

type patternJSON struct {
	AzimuthDeg   float64 `json:"azimuth_deg"`
	ElevationDeg float64 `json:"elevation_deg"`
	GainVDBi     float64 `json:"gain_v_dbi"`
	GainHDBi     float64 `json:"gain_h_dbi"`
}

// patternStepDeg is the step of the pattern in JSON, in azimuth and elevation.
const patternStepDeg = 5

// AntennaJSON writes an antenna as [AntennaOf] gives it.
func AntennaJSON(w io.Writer, a *plan.AntennaResult) error { return indented(w, AntennaOf(a)) }

// AntennaOf returns an antenna as installed as JSON holds it.
func AntennaOf(a *plan.AntennaResult) Antenna {
	out := Antenna{
		Name: a.Name, Kind: a.Kind, FrequencyHz: a.FreqHz, ImpedanceOhm: ohm(a.ImpedanceOhm), VSWR: vswrJSON{a.VSWR, a.ReferenceOhm},
		DirectivityDBi: a.DirectivityDBi, GainDBi: a.GainDBi, Efficiency: a.Efficiency, Segments: a.Segments, Source: a.Source,
		Cut: []cutJSON{}, Warnings: append([]string{}, a.Notes...), Notes: append([]string{}, a.Remarks...),
	}
	if a.ResonantHz > 0 {
		out.ResonantHz, out.HzPerMM = &a.ResonantHz, &a.HzPerMM
	}
	if a.BandHz[1] > 0 {
		out.BandHz = &a.BandHz
	}
	if a.Segments > 0 {
		out.PowerBalance = &a.PowerBalance
	}
	for _, c := range a.Cut {
		out.Cut = append(out.Cut, cutJSON{c.Name, c.LengthM})
	}
	if r := a.Refined; r != nil {
		out.Refined = &refinedJSON{r.Segments, ohm(r.ImpedanceOhm), r.ChangeDB}
	}
	if a.Toward != nil {
		g := gainsOf(a, *a.Toward)
		out.Toward = &towardJSON{a.Toward.AzDeg, a.Toward.ElDeg, g.both, g.v, g.h}
	}
	for el := -90.0; el <= 90; el += patternStepDeg {
		for az := 0.0; az < 360; az += patternStepDeg {
			g := gainsOf(a, antenna.Direction{AzDeg: az, ElDeg: el})
			out.Pattern = append(out.Pattern, patternJSON{az, el, g.v, g.h})
		}
	}
	return out
}

func ohm(z complex128) ohmJSON { return ohmJSON{real(z), imag(z)} }

// gains towards a direction, in dBi: both polarizations together, vertical and horizontal.
type gains struct{ both, v, h float64 }

// leastDBi stands for an exact null.
const leastDBi = -100

func gainsOf(a *plan.AntennaResult, d antenna.Direction) gains {
	f := a.Mount.Field(a.Pattern, d)
	loss := 10 * math.Log10(a.Efficiency)
	share := f.VerticalShare()
	level := func(power float64) float64 { return max(leastDBi, 10*math.Log10(power)+loss) }
	return gains{level(f.Power()), level(f.Power() * share), level(f.Power() * (1 - share))}
}

// AntennaTable writes an antenna as installed, for people: what it does, and what to cut.
func AntennaTable(w io.Writer, a *plan.AntennaResult) error {
	fmt.Fprintf(w, "%s (%s) at %s MHz%s\n\n", a.Name, a.Kind, decimals(a.FreqHz/1e6, 4), a.Where)
	t := newTable("what", "value", "")
	t.AppendRow(table.Row{"impedance", fmt.Sprintf("%s %s j%s ohm", decimals(real(a.ImpedanceOhm), 1), plusMinus(imag(a.ImpedanceOhm)), decimals(math.Abs(imag(a.ImpedanceOhm)), 1)), "at the antenna's own port"})
	t.AppendRow(table.Row{"VSWR", decimals(a.VSWR, 2), fmt.Sprintf("against %g ohm", a.ReferenceOhm)})
	t.AppendRow(table.Row{"gain", decimals(a.GainDBi, 2) + " dBi", fmt.Sprintf("directivity %s dBi, efficiency %s", decimals(a.DirectivityDBi, 2), decimals(a.Efficiency, 4))})
	if a.ResonantHz > 0 {
		t.AppendRow(table.Row{"resonance", decimals(a.ResonantHz/1e6, 3) + " MHz", resonanceWords(a)})
	}
	if a.BandHz[1] > 0 {
		t.AppendRow(table.Row{"VSWR 2 band", fmt.Sprintf("%s to %s MHz", decimals(a.BandHz[0]/1e6, 2), decimals(a.BandHz[1]/1e6, 2)), decimals(100*a.BandWidth(), 1) + " % wide"})
	}
	if a.Toward != nil {
		g := gainsOf(a, *a.Toward)
		t.AppendRow(table.Row{fmt.Sprintf("towards az %g el %g", a.Toward.AzDeg, a.Toward.ElDeg), decimals(g.both, 2) + " dBi", fmt.Sprintf("vertical %s, horizontal %s dBi", decimals(g.v, 2), decimals(g.h, 2))})
	}
	t.AppendRow(table.Row{"source", a.Source, ""})
	if r := a.Refined; r != nil {
		t.AppendRow(table.Row{"convergence", fmt.Sprintf("%d segments change it by %s %s j%s ohm, %s dB", r.Segments, decimals(real(r.ChangeOhm), 2), plusMinus(imag(r.ChangeOhm)), decimals(math.Abs(imag(r.ChangeOhm)), 2), signed(r.ChangeDB, 3)), ""})
	}
	t.wrap("value", 72)
	if _, err := fmt.Fprintln(w, t.Render()); err != nil {
		return err
	}
	if err := cutTable(w, a); err != nil {
		return err
	}
	var notes strings.Builder
	for _, note := range a.Notes {
		fmt.Fprintf(&notes, "warning: %s\n", note)
	}
	for _, remark := range a.Remarks {
		fmt.Fprintf(&notes, "note: %s\n", remark)
	}
	_, err := io.WriteString(w, notes.String())
	return err
}

func plusMinus(x float64) string {
	if x < 0 {
		return "-"
	}
	return "+"
}

func resonanceWords(a *plan.AntennaResult) string {
	if a.HzPerMM == 0 {
		return ""
	}
	return fmt.Sprintf("1 mm more length moves it by %s kHz", signed(a.HzPerMM/1e3, 0))
}

// cutToleranceMM is to what a saw and a tape cut a rod. Common practice, no source.
const cutToleranceMM = 1

// cutTable writes the cut list in millimetres.
func cutTable(w io.Writer, a *plan.AntennaResult) error {
	if len(a.Cut) == 0 {
		return nil
	}
	t := newTable("cut", "mm")
	for _, part := range a.Cut {
		t.AppendRow(table.Row{part.Name, decimals(1000*part.LengthM, 0)})
	}
	t.right("mm")
	_, err := fmt.Fprintf(w, "\n%s\n\nLengths to ±%d mm, the feed gap included.\n", t.Render(), cutToleranceMM)
	return err
}
