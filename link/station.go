package link

import (
	"fellreach/antenna"

	"github.com/paulmach/orb"
)

// A Radio is a transmitter and receiver; its levels are at its port.
type Radio struct {
	Name string
	// PowerDBm is the transmitter's power, DutyPct the share of time it is on.
	PowerDBm, DutyPct float64
	Needs             Need
	// PowerSource says where the power is stated.
	PowerSource string
}

// A Need is the level a receiver asks for: stated as a sensitivity, or as a signal-to-noise
// ratio over its own noise.
type Need struct {
	// SensitivityDBm counts when Stated is true; else k T0 B plus FigureDB plus RequiredSNRDB.
	Stated         bool
	SensitivityDBm float64
	BandwidthHz    float64 // noise bandwidth
	RequiredSNRDB  float64
	// FigureDB is the noise figure: of a receiver given by its sensitivity it says how much
	// noise from outside degrades it.
	FigureDB float64
	// CaptureDB is the wanted over unwanted level the receiver needs on its channel; 0 unknown.
	CaptureDB float64
	Source    string
}

// An Insert lies between radio and antenna. A loss counts in both directions unless it is
// ReceiveOnly; a preamplifier has a GainDB and is receive-only.
type Insert struct {
	Name             string
	LossDB           float64
	GainDB, FigureDB float64 // of a preamplifier
	ReceiveOnly      bool
	AtMast           bool // between feeder and antenna; else between radio and feeder
	Source           string
}

// A Station is one radio with its feed line and its antenna on a mast.
type Station struct {
	// Name is as links name it: the site's, or "site/station".
	Name string
	// Order is the place of its site in the plan: of a link's two ends the lower one is the first
	// end of the profile, so that a path is the same whichever way it is asked for.
	Order int
	At    orb.Point // lon, lat, degrees, WGS 84
	// GroundAslM is a surveyed ground height in place of the raster's, nil when there is none.
	GroundAslM *float64
	// ClearingM is the distance within which cover heights are left out.
	ClearingM    float64
	Surroundings Surroundings
	Noise        Noise
	// CanopyM is the height of the land cover the site stands in, where the ground is bare;
	// OnCanopyM the same where the raster's heights hold the cover. Zero is none, or not known.
	CanopyM, OnCanopyM float64

	Radio   Radio
	Inserts []Insert
	// Run is the feeder; the zero Run is 50 ohm without loss. Match is the transformer at the
	// antenna.
	Run   antenna.Run
	Match antenna.Match
	// HarnessDB is the loss of a stack's harness, between transformer and antennas.
	HarnessDB float64
	// The sources say where feeder, connectors, transformer and harness are stated.
	RunSource, ConnectorSource, MatchSource, HarnessSource string

	Antenna       antenna.Design
	AntennaSource string
	// CutForHz is the frequency the antenna's resonant lengths are cut for; 0 is each link's own.
	CutForHz float64
	// AglM is the height of the antenna's feed above ground, in metres.
	AglM  float64
	Mount antenna.Mount
	// MastDiameterM, StandoffM and MastAboveM are the metal beside the antenna (see
	// [antenna.Setting]).
	MastDiameterM, StandoffM, MastAboveM float64
}
