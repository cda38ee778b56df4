package antenna

import (
	"math"
	"strings"
	"testing"

	"pgregory.net/rapid"
)

// An invented half-inch line.
func halfInch() Feeder {
	return Feeder{
		Name: "half-inch", ImpedanceOhm: 50, VelocityFactor: 0.88,
		Loss:   []LossPoint{{450e6, 0.049}, {100e6, 0.022}},
		Source: "the maker's table",
	}
}

// Worked by hand: with loss = a + b sqrt(f), 0.022 at 100 MHz (root 10) and 0.049 at 450 MHz
// (root 21.2132) make b = 0.0024079 and a = -0.0020786.
func TestLossDBPerM(t *testing.T) {
	for _, tc := range []struct {
		freqHz, want float64
		note         string
	}{
		{100e6, 0.022, ""},
		{450e6, 0.049, ""},
		{151.5e6, 0.027559, ""},
		{225e6, 0.034040, ""},
		{50e6, 0.022 * math.Sqrt(0.5), "goes on from 100 MHz"},
		{99e6, 0.022 * math.Sqrt(0.99), "goes on from 100 MHz"},
		{900e6, 0.049 * math.Sqrt2, "goes on from 450 MHz"},
	} {
		got, note, err := halfInch().LossDBPerM(tc.freqHz)
		if err != nil {
			t.Errorf("%g Hz: %v", tc.freqHz, err)
		}
		near(t, "loss", got, tc.want, 2e-6)
		if (note == "") != (tc.note == "") || !strings.Contains(note, tc.note) {
			t.Errorf("%g Hz: note %q, want %q", tc.freqHz, note, tc.note)
		}
	}
	for _, freqHz := range []float64{49.9e6, 901e6} {
		_, _, err := halfInch().LossDBPerM(freqHz)
		wantError(t, "far beyond", err, "stated from 100 MHz to 450 MHz")
	}
}

func TestLossOfOnePoint(t *testing.T) {
	f := halfInch()
	f.Loss = f.Loss[:1]
	got, note, err := f.LossDBPerM(450e6)
	if err != nil || note != "" || got != 0.049 {
		t.Errorf("at its point: %g, %q, %v", got, note, err)
	}
	got, note, err = f.LossDBPerM(300e6)
	if err != nil || note == "" {
		t.Errorf("below its point: %q, %v", note, err)
	}
	near(t, "below its point", got, 0.049*math.Sqrt(300.0/450), 1e-12)
}

// A line whose loss goes as the square root of frequency is given back at every frequency.
func TestLossOfPureSkinEffect(t *testing.T) {
	f := halfInch()
	skin := func(freqHz float64) float64 { return 0.03 * math.Sqrt(freqHz/200e6) }
	f.Loss = nil
	for _, freqHz := range []float64{400e6, 50e6, 100e6, 200e6} {
		f.Loss = append(f.Loss, LossPoint{freqHz, skin(freqHz)})
	}
	rapid.Check(t, func(t *rapid.T) {
		freqHz := rapid.Float64Range(25e6, 800e6).Draw(t, "frequency")
		got, note, err := f.LossDBPerM(freqHz)
		if err != nil || math.Abs(got-skin(freqHz)) > 1e-9 {
			t.Fatalf("loss at %g Hz = %g, %v, want %g", freqHz, got, err, skin(freqHz))
		}
		if within := freqHz >= 50e6 && freqHz <= 400e6; within != (note == "") {
			t.Fatalf("note at %g Hz: %q", freqHz, note)
		}
	})
}

func TestFeederCheck(t *testing.T) {
	for _, tc := range []struct {
		name string
		edit func(*Feeder)
		says string
	}{
		{"impedance", func(f *Feeder) { f.ImpedanceOhm = 0 }, "feeder half-inch: impedance 0 ohm is out of range: 10 to 1000"},
		{"impedance NaN", func(f *Feeder) { f.ImpedanceOhm = math.NaN() }, "impedance NaN"},
		{"velocity", func(f *Feeder) { f.VelocityFactor = 1.1 }, "velocity_factor 1.1"},
		{"no loss", func(f *Feeder) { f.Loss = nil }, "no loss is given"},
		{"negative loss", func(f *Feeder) { f.Loss[0].DBPerM = -0.1 }, "loss at 450 MHz -0.1 dB/m is out of range: 0 to 10"},
		{"loss in dB/100m", func(f *Feeder) { f.Loss[0].DBPerM = 49 }, "loss at 450 MHz 49 dB/m"},
		{"NaN loss", func(f *Feeder) { f.Loss[0].DBPerM = math.NaN() }, "NaN dB/m"},
		{"frequency", func(f *Feeder) { f.Loss[0].FreqHz = 0 }, "frequency of a loss 0 Hz"},
		{"endless frequency", func(f *Feeder) { f.Loss[0].FreqHz = math.Inf(1) }, "frequency of a loss +Inf"},
		{"twice", func(f *Feeder) { f.Loss[0].FreqHz = 100e6 }, "loss at 100 MHz is given twice"},
	} {
		f := halfInch()
		tc.edit(&f)
		wantError(t, tc.name, f.Check(), tc.says)
		_, _, err := f.LossDBPerM(150e6)
		wantError(t, tc.name+", used", err, tc.says)
	}
	if err := halfInch().Check(); err != nil {
		t.Error(err)
	}
	_, _, err := halfInch().LossDBPerM(math.NaN())
	wantError(t, "NaN frequency", err, "frequency NaN")
}

func TestRunMatchedLoss(t *testing.T) {
	run := Run{Feeder: halfInch(), LengthM: 27, ConnectorCount: 4, ConnectorLossDB: 0.05}
	got, note, err := run.MatchedLossDB(450e6)
	if err != nil || note != "" {
		t.Errorf("%q, %v", note, err)
	}
	near(t, "27 m and four connectors", got, 27*0.049+0.2, 1e-12)
	for _, tc := range []struct {
		name string
		run  Run
		want float64
	}{
		{"none", Run{}, 0},
		{"connectors alone", Run{ConnectorCount: 2, ConnectorLossDB: 0.1}, 0.2},
		{"no length", Run{Feeder: halfInch()}, 0},
	} {
		got, _, err := tc.run.MatchedLossDB(5e9)
		if err != nil {
			t.Errorf("%s: %v", tc.name, err)
		}
		near(t, tc.name, got, tc.want, 1e-12)
	}
	if got := (Run{}).ImpedanceOhm(); got != 50 {
		t.Errorf("no feeder is %g ohm, want 50", got)
	}
	for _, tc := range []struct {
		name string
		run  Run
		says string
	}{
		{"length", Run{LengthM: -1}, "feeder length -1 m"},
		{"count", Run{ConnectorCount: -1}, "connector count -1"},
		{"connector", Run{ConnectorLossDB: math.NaN()}, "connector loss NaN"},
		{"length of nothing", Run{LengthM: 5}, "no loss is given"},
	} {
		_, _, err := tc.run.MatchedLossDB(150e6)
		wantError(t, tc.name, err, tc.says)
	}
}
