package plan

// The types of this file and of shape_antenna.go and shape_site.go are the shape of a plan
// file. A field without omitempty is required; the jsonschema tags are honoured by the decoder
// and by the published schema.

// A Plan is a plan file as written: read, strict in form, its references checked, its defaults
// filled in.
type Plan struct {
	Format      int                `json:"format" jsonschema:"minimum=1,maximum=1" jsonschema_description:"version of this file's format: 1"`
	Title       string             `json:"title,omitempty"`
	Ground      Ground             `json:"ground"`
	Method      string             `json:"method,omitempty" jsonschema:"enum=p1812,enum=p526,enum=free-space"`
	Air         Air                `json:"air,omitempty"`
	Noise       *Noise             `json:"noise,omitempty"`
	Aim         *Aim               `json:"aim,omitempty"`
	Prediction  *Prediction        `json:"prediction,omitempty"`
	Declination *Angle             `json:"declination,omitempty" jsonschema_description:"magnetic declination, east positive, for the bearings on crew sheets"`
	Channels    map[string]Channel `json:"channels" jsonschema:"minProperties=1"`
	Feeders     map[string]Feeder  `json:"feeders,omitempty"`
	Radios      map[string]Radio   `json:"radios,omitempty"`
	Antennas    map[string]Antenna `json:"antennas" jsonschema:"minProperties=1"`
	Sites       []Site             `json:"sites" jsonschema:"minItems=1"`
	Links       Links              `json:"links"`
	Coverage    []Coverage         `json:"coverage,omitempty"`
	Weigh       []Weigh            `json:"weigh,omitempty"`

	file  string
	where map[string]position // of every key and item, by its path
}

// Ground names the rasters that hold the terrain and how profiles are taken from them.
type Ground struct {
	Elevation   ElevationFiles `json:"elevation"`
	Cover       *Cover         `json:"cover,omitempty"`
	Step        *Length        `json:"step,omitempty" jsonschema_description:"longest distance between two points of a profile"`
	BridgeVoids *Distance      `json:"bridge_voids,omitempty" jsonschema_description:"longest void that a profile may cross, with a warning"`
	Beyond      string         `json:"beyond,omitempty" jsonschema:"enum=void,enum=sea" jsonschema_description:"what lies outside the rasters"`
}

// ElevationFiles are joined: the first listed wins, the others fill its voids.
type ElevationFiles struct {
	Files []string `json:"files" jsonschema:"minItems=1"`
	Holds string   `json:"holds,omitempty" jsonschema:"enum=bare,enum=surface" jsonschema_description:"bare ground, or surface: with trees and roofs in it"`
}

// Cover is a categorical raster of land cover with a table of its classes.
type Cover struct {
	Raster  string        `json:"raster"`
	Classes map[int]Class `json:"classes" jsonschema:"minProperties=1"`
}

// Class is what one value of the cover raster stands for.
type Class struct {
	Height Distance `json:"height"`
	Zone   string   `json:"zone,omitempty" jsonschema:"enum=sea,enum=inland"`
}

// Air is the refractivity at the path centre, by Rec. ITU-R P.453.
type Air struct {
	N0        *float64 `json:"n0,omitempty" jsonschema:"minimum=200,maximum=500" jsonschema_description:"sea-level surface refractivity, N-units"`
	DeltaN    *float64 `json:"delta_n,omitempty" jsonschema:"minimum=1,maximum=120" jsonschema_description:"fall of refractivity over the lowest kilometre, N-units per km"`
	Dn1       *float64 `json:"dn1,omitempty" jsonschema:"minimum=-1500,maximum=0" jsonschema_description:"refractivity gradient of the lowest 65 m not exceeded for 1 % of the year, N-units per km, for P.530"`
	Roughness *Length  `json:"roughness,omitempty" jsonschema_description:"standard deviation of the terrain heights in a square of 110 km, for P.530"`
}

// Aim is what a link must reach.
type Aim struct {
	Availability *Percent  `json:"availability,omitempty" jsonschema_description:"share of an average year"`
	Margin       *Decibels `json:"margin,omitempty"`
	Chance       *Percent  `json:"chance,omitempty" jsonschema_description:"chance that the link, once built, meets its availability; in place of a margin"`
}

// Prediction is what readings on site say of the path method.
type Prediction struct {
	Spread   *Loss     `json:"spread,omitempty"`
	Bias     *Decibels `json:"bias,omitempty"`
	Readings int       `json:"readings,omitempty" jsonschema:"minimum=0"`
}

// Channel is one frequency, or a pair: out from the from end of a link to its to end, back the
// other way.
type Channel struct {
	Frequency *Frequency `json:"frequency,omitempty"`
	Out       *Frequency `json:"out,omitempty"`
	Back      *Frequency `json:"back,omitempty"`
	Bandwidth Frequency  `json:"bandwidth"`
}

// Feeder is a kind of cable.
type Feeder struct {
	Impedance      Resistance `json:"impedance"`
	VelocityFactor *float64   `json:"velocity_factor,omitempty" jsonschema:"minimum=0.3,maximum=1"`
	Loss           LossTable  `json:"loss"`
}

// Radio is a kind of transmitter and receiver; power and sensitivity are at its port.
type Radio struct {
	Power          *Power     `json:"power,omitempty"`
	Duty           *Percent   `json:"duty,omitempty"`
	Sensitivity    *Level     `json:"sensitivity,omitempty"`
	NoiseFigure    *Loss      `json:"noise_figure,omitempty"`
	NoiseBandwidth *Frequency `json:"noise_bandwidth,omitempty"`
	RequiredSNR    *Decibels  `json:"required_snr,omitempty"`
	Capture        *Decibels  `json:"capture,omitempty" jsonschema_description:"wanted over unwanted level on the same channel that the receiver needs"`
}

// Link is a path that must work.
type Link struct {
	From       string      `json:"from"`
	To         string      `json:"to"`
	Channel    string      `json:"channel,omitempty"`
	Name       string      `json:"name,omitempty"`
	Via        []string    `json:"via,omitempty" jsonschema_description:"sites that relay, in order"`
	OneWay     bool        `json:"one_way,omitempty"`
	Aim        *Aim        `json:"aim,omitempty"`
	Fade       *Loss       `json:"fade,omitempty" jsonschema_description:"a stated fading allowance in place of the computed one"`
	Allowances []Allowance `json:"allowances,omitempty"`
}

// Allowance is a loss set aside by the planner.
type Allowance struct {
	Name string `json:"name"`
	Loss Loss   `json:"loss"`
}

// Coverage asks for a map around a site.
type Coverage struct {
	Site         string     `json:"site"`
	Range        Length     `json:"range"`
	Cell         *Length    `json:"cell,omitempty"`
	Locations    *Percent   `json:"locations,omitempty"`
	Availability *Percent   `json:"availability,omitempty"`
	Mobile       Mobile     `json:"mobile"`
	Bands        []Decibels `json:"bands,omitempty"`
	Channel      string     `json:"channel,omitempty"`
}

// Mobile is the far end of a coverage map.
type Mobile struct {
	Kind            string `json:"kind,omitempty" jsonschema:"enum=handheld,enum=vehicle"`
	Radio           string `json:"radio"`
	AntennaHeight   Length `json:"antenna_height"`
	Gain            *Gain  `json:"gain,omitempty"`
	BodyLoss        *Loss  `json:"body_loss,omitempty"`
	PenetrationLoss *Loss  `json:"penetration_loss,omitempty"`
	Fade            *Loss  `json:"fade,omitempty" jsonschema_description:"small-scale fading allowance"`
}

// Weigh asks for the trade of height against antenna at a site.
type Weigh struct {
	Site     string    `json:"site"`
	Links    LinkNames `json:"links,omitempty"`
	Heights  []Length  `json:"heights" jsonschema:"minItems=3,maxItems=3" jsonschema_description:"from, to, step"`
	Antennas []string  `json:"antennas" jsonschema:"minItems=1"`
	Cost     *Cost     `json:"cost,omitempty"`
}

// Cost holds prices in any one currency.
type Cost struct {
	MastPerMetre   float64            `json:"mast_per_metre,omitempty" jsonschema:"minimum=0"`
	FeederPerMetre float64            `json:"feeder_per_metre,omitempty" jsonschema:"minimum=0"`
	Antennas       map[string]float64 `json:"antennas,omitempty"`
}
