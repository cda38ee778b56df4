package plan

import (
	"maps"
	"reflect"

	"fellreach/link"
	"fellreach/terrain/raster"

	"github.com/paulmach/orb"
)

// OpenAfter opens the plan as [Plan.Open] does, on the ground of a network opened before where both
// ask for the same ([Network.SharesGround] tells), and with the antennas of a network that both
// describe alike: what is solved for one is then remembered by both, for as long as either lives. The
// network before must still be open; antennas may be nil.
func (p *Plan) OpenAfter(before, antennas *Network) (*Network, error) {
	return p.open(before, p.designsOf(antennas))
}

// SharesGround tells whether two networks stand on one ground: then only one of them is closed.
func (n *Network) SharesGround(other *Network) bool { return other != nil && n.Ground == other.Ground }

// Place returns the place of a site, by its index in the plan.
func (n *Network) Place(site int) orb.Point { return n.places[site] }

// Plan returns the plan that the network was opened from.
func (n *Network) Plan() *Plan { return n.plan }

func (n *Network) openGround(before *Network) (err error) {
	if before != nil && reflect.DeepEqual(n.spec, before.spec) {
		n.Ground = before.Ground
		return nil
	}
	n.Ground, err = raster.Open(n.spec)
	return err
}

// designsOf returns the antennas of a network that the plan describes alike. What they have
// solved is remembered in them.
func (p *Plan) designsOf(n *Network) map[string]built {
	if n == nil {
		return map[string]built{}
	}
	n.designing.Lock()
	designs := maps.Clone(n.designs)
	n.designing.Unlock()
	maps.DeleteFunc(designs, func(name string, _ built) bool { return !p.sameAntenna(n.plan, name) })
	return designs
}

// sameAntenna tells whether two plans describe an antenna alike, down to what it is a stack of.
func (p *Plan) sameAntenna(q *Plan, name string) bool {
	a, inP := p.Antennas[name]
	b, inQ := q.Antennas[name]
	if !inP || !inQ || !reflect.DeepEqual(a, b) {
		return false
	}
	if stack, ok := a.Spec.(*Stack); ok {
		return p.sameAntenna(q, stack.Of)
	}
	return true
}

// Channel returns a channel of the plan with its frequencies.
func (p *Plan) Channel(name string) link.Channel { return p.Channels[name].resolve(name) }

// MastSize returns the height of the site's mast and its diameter or face width in metres, zero where
// the plan does not say.
func (s Site) MastSize() (heightM, widthM float64) {
	if s.Mast == nil {
		return 0, 0
	}
	return mastSize(s.Mast)
}

// String writes the place as the plan does.
func (a At) String() string {
	if a.EPSG != nil {
		where, _ := a.coordinates() // an EPSG place has no text to be wrong
		return where.String()
	}
	return a.Text
}
