package plan

// An Antenna is one of the kinds of antennaKinds.
type Antenna = OneOf[antennaKinds]

type antennaKinds struct{}

func (antennaKinds) kinds() []kind {
	return []kind{
		{name: "dipole", spec: &Dipole{}},
		{name: "folded-dipole", spec: &FoldedDipole{}},
		{name: "yagi", spec: &Yagi{}},
		{name: "stack", spec: &Stack{}},
		{name: "wires", spec: &Wires{}},
		{name: "table", spec: &PatternTable{}},
		{name: "cuts", spec: &PatternCuts{}},
		{name: "omni", spec: &Omni{}},
		{name: "datasheet", spec: &Datasheet{}},
	}
}

// Metal is what a wire antenna is made of.
type Metal struct {
	Material string `json:"material" jsonschema:"enum=copper,enum=aluminium,enum=brass,enum=stainless,enum=steel,enum=ideal"`
}

// Match is a transformer between feeder and antenna.
type Match struct {
	Ratio *Ratio `json:"ratio,omitempty" jsonschema_description:"antenna impedance to feeder impedance"`
	Loss  *Loss  `json:"loss,omitempty"`
}

// Dipole is a straight rod fed at one place.
type Dipole struct {
	Length   RodLength `json:"length"`
	FeedAt   *float64  `json:"feed_at,omitempty" jsonschema:"minimum=0,maximum=1" jsonschema_description:"fraction of the length from the lower end; 0.5 when left out"`
	Diameter Length    `json:"diameter"`
	Metal
	Match *Match `json:"match,omitempty"`
}

// FoldedDipole is two parallel rods joined at both ends, one of them fed in the middle.
type FoldedDipole struct {
	Length   RodLength `json:"length"`
	Diameter Length    `json:"diameter"`
	Spacing  Length    `json:"spacing"`
	Metal
	Match *Match `json:"match,omitempty"`
}

// Yagi is parallel rods along a boom, one of them fed.
type Yagi struct {
	Diameter Length `json:"diameter"`
	Metal
	Elements []Element `json:"elements" jsonschema:"minItems=2"`
	Match    *Match    `json:"match,omitempty"`
}

// Element is one rod of a yagi; At is its place along the boom, growing towards the beam.
type Element struct {
	Length RodLength `json:"length"`
	At     Offset    `json:"at"`
	Driven bool      `json:"driven,omitempty"`
}

// Stack is several of one antenna above each other, fed in phase.
type Stack struct {
	Of      string `json:"of"`
	Count   int    `json:"count" jsonschema:"minimum=2,maximum=16"`
	Spacing Span   `json:"spacing"`
	Harness *Loss  `json:"harness,omitempty"`
	Match   *Match `json:"match,omitempty"`
}

// Wires is any antenna of straight wires; coordinates in metres, x the facing, z up.
type Wires struct {
	Wires []Wire `json:"wires" jsonschema:"minItems=1"`
	Feeds []Feed `json:"feeds" jsonschema:"minItems=1"`
	Metal
	Match *Match `json:"match,omitempty"`
}

// Wire is one straight wire.
type Wire struct {
	From     []float64 `json:"from" jsonschema:"minItems=3,maxItems=3"`
	To       []float64 `json:"to" jsonschema:"minItems=3,maxItems=3"`
	Diameter Length    `json:"diameter"`
}

// Feed is where a wire is fed: At is a fraction of its length.
type Feed struct {
	Wire int     `json:"wire" jsonschema:"minimum=1"`
	At   float64 `json:"at" jsonschema:"minimum=0,maximum=1"`
}

// Port is the connector of a bought antenna.
type Port struct {
	Impedance Resistance `json:"impedance"`
	VSWR      *float64   `json:"vswr,omitempty" jsonschema:"minimum=1,maximum=20"`
}

// PatternTable is a bought antenna with its whole pattern in a CSV file.
type PatternTable struct {
	Pattern string `json:"pattern"`
	Port
}

// PatternCuts is a bought antenna with two cuts in CSV files.
type PatternCuts struct {
	Horizontal string `json:"horizontal"`
	Vertical   string `json:"vertical"`
	Gain       Gain   `json:"gain"`
	Port
}

// Omni is a bought omnidirectional antenna, by the reference pattern of Rec. ITU-R F.1336.
type Omni struct {
	Gain Gain `json:"gain"`
	Port
}

// Datasheet is a bought antenna by the figures of its data sheet.
type Datasheet struct {
	Gain        Gain  `json:"gain"`
	WidthH      Angle `json:"width_h"`
	WidthV      Angle `json:"width_v"`
	FrontToBack Loss  `json:"front_to_back"`
	Port
}
