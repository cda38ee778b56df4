package plan

import (
	"errors"
	"fmt"
	"math"
	"sync"

	"fellreach/link"
	"fellreach/terrain"
	"fellreach/terrain/raster"

	"github.com/paulmach/orb"
)

// A Network is a plan ready to run: its ground is open, its places are known, its names have
// become stations and links.
type Network struct {
	Title      string
	Ground     *raster.Ground
	Stations   map[string]*link.Station // by the name that links use
	Links      []*link.Link             // in the order of the plan
	Conditions link.Conditions

	plan    *Plan
	places  []orb.Point // of the plan's sites
	spec    raster.Spec
	designs map[string]built // by the antenna's name

	designing sync.Mutex // guards designs once the network is open
}

// Open opens the plan's rasters and resolves its names. Errors are [Errors] where they have a
// place in the plan. The caller closes the network.
func (p *Plan) Open() (*Network, error) { return p.open(nil, map[string]built{}) }

// open resolves the plan, on the ground of a network opened before if it can, and with antennas that
// have been made ready.
func (p *Plan) open(before *Network, designs map[string]built) (*Network, error) {
	n := &Network{
		Title:      p.Title,
		Stations:   map[string]*link.Station{},
		Conditions: p.conditions(),
		plan:       p,
		spec:       p.groundSpec(),
		designs:    designs,
	}
	c := &checker{Plan: p}
	n.locate(c)
	n.addStations(c)
	n.addLinks(c)
	if len(c.errs) > 0 {
		return nil, c.errs.sorted()
	}
	if err := n.openGround(before); err != nil {
		return nil, c.at("ground", err)
	}
	n.checkGround(c)
	n.findCanopies(c)
	if len(c.errs) > 0 {
		if !n.SharesGround(before) {
			n.Close()
		}
		return nil, c.errs.sorted()
	}
	return n, nil
}

// conditions are what holds for all links of the plan.
func (p *Plan) conditions() link.Conditions {
	c := link.Conditions{
		Method: methods[p.Method].model, DeltaN: *p.Air.DeltaN, N0: *p.Air.N0, Dn1: *p.Air.Dn1, Dn1Source: "assumed",
		SpreadDB: float64(*p.Prediction.Spread), BiasDB: float64(*p.Prediction.Bias), Readings: p.Prediction.Readings,
	}
	if _, stated := p.where["air.dn1"]; stated {
		c.Dn1Source = p.source("air.dn1")
	}
	if p.Air.Roughness != nil {
		c.RoughnessM = float64(*p.Air.Roughness)
	}
	return c
}

// findCanopies tells every station which cover it stands in.
func (n *Network) findCanopies(c *checker) {
	for name := range sorted(n.Stations) {
		s := n.Stations[name]
		class, known, err := n.Ground.CoverAt(s.At)
		switch {
		case err != nil:
			c.refuse("ground.cover", err)
			return
		case !known || s.Surroundings != (link.Surroundings{}):
		case n.plan.Ground.Elevation.Holds == "surface" && s.GroundAslM == nil:
			s.OnCanopyM = class.HeightM
		default:
			s.CanopyM = class.HeightM
		}
	}
}

// Close closes the rasters.
func (n *Network) Close() { n.Ground.Close() }

// at gives an error its place in the plan.
func (c *checker) at(path string, err error) error {
	before := len(c.errs)
	c.refuse(path, err)
	return c.errs[before:]
}

// refuse reports an error from below at a place of the plan.
func (c *checker) refuse(path string, err error) {
	var h *Refusal
	if errors.As(err, &h) {
		c.wrong(path, h.Problem, h.Hint)
		return
	}
	c.wrong(path, err.Error(), "")
}

func (p *Plan) groundSpec() raster.Spec {
	spec := raster.Spec{
		Surface:   p.Ground.Elevation.Holds == "surface",
		BridgeM:   float64(*p.Ground.BridgeVoids),
		BeyondSea: p.Ground.Beyond == "sea",
	}
	for _, f := range p.Ground.Elevation.Files {
		spec.Elevation = append(spec.Elevation, p.resolvePath(f))
	}
	if p.Ground.Step != nil {
		spec.StepM = float64(*p.Ground.Step)
	}
	if cover := p.Ground.Cover; cover != nil {
		spec.Cover = p.resolvePath(cover.Raster)
		spec.Classes = terrain.Classes{}
		for value, class := range cover.Classes {
			zone := terrain.Inland
			if class.Zone == "sea" {
				zone = terrain.Sea
			}
			spec.Classes[value] = terrain.Class{HeightM: float64(class.Height), Zone: zone}
		}
	}
	return spec
}

// samePlaceM is how near two sites must not be: a link between them has no path.
const samePlaceM = 1

// locate finds the places of all sites.
func (n *Network) locate(c *checker) {
	n.places = make([]orb.Point, len(c.Sites))
	for i, s := range c.Sites {
		path := fmt.Sprintf("sites[%d].at", i)
		where, _ := s.At.coordinates() // checked by Parse
		var err error
		if n.places[i], err = raster.Locate(where); err != nil {
			c.refuse(path, err)
			continue
		}
		for j := range i {
			if !sameLatitude(n.places[i], n.places[j]) {
				continue
			}
			if d, _, _ := raster.Inverse(n.places[i], n.places[j]); d < samePlaceM {
				c.wrong(path, fmt.Sprintf("%q stands where %q stands", s.Name, c.Sites[j].Name), "put several radios at one place into the stations of one site")
			}
		}
	}
}

// sameLatitude is a quick look before the geodesic: a metre is under 1e-5 degrees of latitude.
func sameLatitude(a, b orb.Point) bool { return math.Abs(a.Lat()-b.Lat()) < 1e-5*samePlaceM }

// checkGround reports the ends of links that stand where the rasters have no height, once for each
// site; what else is wrong with the ground comes out with the links.
func (n *Network) checkGround(c *checker) {
	reported := map[int]bool{}
	for _, s := range n.ends() {
		var void *terrain.VoidError
		if _, err := n.Ground.HeightAslM(s.At); errors.As(err, &void) && !reported[s.Order] {
			reported[s.Order] = true
			c.refuse(fmt.Sprintf("sites[%d].at", s.Order), fmt.Errorf("%q: %w", c.Sites[s.Order].Name, err))
		}
	}
}

func (a At) coordinates() (terrain.Coordinates, error) {
	if a.EPSG != nil {
		return terrain.Coordinates{EPSG: a.EPSG.EPSG, Easting: a.EPSG.Easting, Northing: a.EPSG.Northing}, nil
	}
	return terrain.ParseCoordinates(a.Text)
}

func (n *Network) addLinks(c *checker) {
	if c.Links.Auto {
		c.wrong("links", "auto is not done by this version", "list the links")
	}
	for i, l := range c.Links.List {
		path := fmt.Sprintf("links[%d]", i)
		if len(l.Via) > 0 {
			c.wrong(path+".via", "chains are not computed by this version", "write each hop as a link of its own")
			continue
		}
		n.Links = append(n.Links, n.link(c, path, l))
	}
}

// link resolves a link. The first one that uses a station says what its antenna is cut for.
func (n *Network) link(c *checker, path string, l Link) *link.Link {
	out := &link.Link{
		Name: l.Name, From: n.Stations[l.From], To: n.Stations[l.To], OneWay: l.OneWay,
		Channel: c.Channels[l.Channel].resolve(l.Channel),
		Aim:     l.Aim.resolve(),
	}
	for _, s := range []*link.Station{out.From, out.To} {
		if s.CutForHz == 0 {
			s.CutForHz = out.Channel.CentreHz()
		}
	}
	if l.Fade != nil {
		out.Fade = &link.Allowance{Name: "fading", LossDB: float64(*l.Fade), Source: "stated, " + c.source(path+".fade")}
	}
	for i, a := range l.Allowances {
		out.Allowances = append(out.Allowances, link.Allowance{Name: a.Name, LossDB: float64(a.Loss), Source: c.source(fmt.Sprintf("%s.allowances[%d]", path, i))})
	}
	return out
}

func (a *Aim) resolve() link.Aim {
	out := link.Aim{AvailabilityPct: float64(*a.Availability)}
	if a.Margin != nil {
		out.MarginDB = float64(*a.Margin)
	}
	if a.Chance != nil {
		out.ChancePct = float64(*a.Chance)
	}
	return out
}

func (ch Channel) resolve(name string) link.Channel {
	out := link.Channel{Name: name, BandwidthHz: float64(ch.Bandwidth)}
	if ch.Frequency != nil {
		out.OutHz, out.BackHz = float64(*ch.Frequency), float64(*ch.Frequency)
	} else {
		out.OutHz, out.BackHz = float64(*ch.Out), float64(*ch.Back)
	}
	return out
}
