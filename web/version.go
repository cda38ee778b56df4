package web

import (
	"context"
	"crypto/sha256"
	"encoding/hex"
	"sync"

	"fellreach/link/plan"
)

// A version is one text of the plan, opened: the file's, or one that was tried.
type version struct {
	id      string // names the text
	text    []byte
	plan    *plan.Plan
	network *plan.Network
	ground  *ground

	users   int  // requests at work on it; guarded by the shelf
	dropped bool // no longer on the shelf

	computing sync.Mutex
	result    *plan.Result // all links, once they have been asked for
}

// idOf names a text by its hash.
func idOf(text []byte) string {
	sum := sha256.Sum256(text)
	return hex.EncodeToString(sum[:8])
}

// links computes all links of the version, once.
func (v *version) links(ctx context.Context) (*plan.Result, error) {
	v.computing.Lock()
	defer v.computing.Unlock()
	if v.result != nil {
		return v.result, nil
	}
	result, err := v.network.Run(ctx, nil)
	if err == nil {
		v.result = result
	}
	return result, err
}

// maxGeneration is how many versions share what their antennas have solved: one setting of an antenna
// beside a wide mast takes about a megabyte.
const maxGeneration = 24

// A generation is the versions that share solved antennas, so that those are not kept for good.
type generation struct {
	mutex  sync.Mutex
	member *plan.Network // any of them; nil where the next begins a new generation
	count  int
}

// last returns the network whose antennas the next version may share, nil for none.
func (g *generation) last() *plan.Network {
	g.mutex.Lock()
	defer g.mutex.Unlock()
	if g.count >= maxGeneration {
		g.member, g.count = nil, 0
	}
	return g.member
}

func (g *generation) add(n *plan.Network) {
	g.mutex.Lock()
	defer g.mutex.Unlock()
	g.member = n
	g.count++
}

// alone returns the version's network anew, so that what is solved for one question is forgotten with
// the answer. The version must be in use.
func (v *version) alone() (*plan.Network, error) { return v.plan.OpenAfter(v.network, nil) }
