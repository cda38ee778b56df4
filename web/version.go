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

// A ground is the open rasters that some versions stand on; the last of them closes it.
type ground struct {
	network *plan.Network // one that holds it open
	users   int           // versions; guarded by the shelf
}
