package plan

// Site is a place with a mast; it holds one station, or several under names.
type Site struct {
	Name         string        `json:"name"`
	At           At            `json:"at"`
	GroundLevel  *Elevation    `json:"ground_level,omitempty" jsonschema_description:"surveyed height above sea level, in place of the raster's"`
	Clearing     *Distance     `json:"clearing,omitempty" jsonschema_description:"cover heights nearer than this are left out"`
	Surroundings *Surroundings `json:"surroundings,omitempty"`
	Noise        *Noise        `json:"noise,omitempty"`
	Mast         *Mast         `json:"mast,omitempty"`
	Station
	Stations map[string]Station `json:"stations,omitempty" jsonschema:"minProperties=1"`
}

// Station is one radio with its feeder and antenna.
type Station struct {
	Radio   string      `json:"radio,omitempty"`
	Antenna *AntennaUse `json:"antenna,omitempty"`
	Feeder  *FeederUse  `json:"feeder,omitempty"`
	Inserts []Insert    `json:"inserts,omitempty"`
}

// AntennaUse is an antenna as it hangs on its mast.
type AntennaUse struct {
	Use          string        `json:"use"`
	AboveGround  Length        `json:"above_ground"`
	Facing       *Facing       `json:"facing,omitempty"`
	Polarization *Polarization `json:"polarization,omitempty"`
	Standoff     *Length       `json:"standoff,omitempty"`
	Tilt         *Angle        `json:"tilt,omitempty" jsonschema_description:"up positive"`
}

// FeederUse is a run of cable.
type FeederUse struct {
	Use        string      `json:"use"`
	Length     Length      `json:"length"`
	Connectors *Connectors `json:"connectors,omitempty"`
}

// Connectors are all alike.
type Connectors struct {
	Count    int  `json:"count" jsonschema:"minimum=0,maximum=100"`
	LossEach Loss `json:"loss_each"`
}

// Insert is something between radio and antenna: a loss, or a receive preamplifier.
type Insert struct {
	Name        string `json:"name"`
	Loss        *Loss  `json:"loss,omitempty"`
	Gain        *Loss  `json:"gain,omitempty"`
	NoiseFigure *Loss  `json:"noise_figure,omitempty"`
	ReceiveOnly bool   `json:"receive_only,omitempty"`
	Where       string `json:"where,omitempty" jsonschema:"enum=radio,enum=mast" jsonschema_description:"which end of the feeder; radio when left out"`
}

// A Mast is a pole, also where its kind is left out, or a lattice tower.
type Mast = OneOf[mastKinds]

type mastKinds struct{}

func (mastKinds) kinds() []kind {
	return []kind{{"pole", &Pole{}, true}, {"lattice", &Lattice{}, false}}
}

// Pole is a round mast.
type Pole struct {
	Height   Length  `json:"height"`
	Diameter *Length `json:"diameter,omitempty"`
}

// Lattice is a tower; Width is that of a face.
type Lattice struct {
	Height Length  `json:"height"`
	Width  *Length `json:"width,omitempty"`
}

// Surroundings is what stands right around a site, beyond what the cover raster shows.
type Surroundings = OneOf[surroundingKinds]

type surroundingKinds struct{}

func (surroundingKinds) kinds() []kind {
	return []kind{{name: "woodland", spec: &Woodland{}}, {name: "built", spec: &Built{}}}
}

// Woodland is trees around a terminal, by Rec. ITU-R P.833.
type Woodland struct {
	Depth Length `json:"depth"`
}

// Built is houses around a terminal, by Rec. ITU-R P.2108.
type Built struct {
	Height Length `json:"height"`
	Street Length `json:"street"`
}
