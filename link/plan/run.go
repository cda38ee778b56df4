package plan

import (
	"context"
	"fmt"
	"runtime"
	"slices"
	"sync"

	"fellreach/link"
	"fellreach/terrain"

	"golang.org/x/sync/errgroup"
)

// A Result is a plan computed: its links in the order of the plan.
type Result struct {
	Title  string
	Method string   // edition of the path method
	Aim    link.Aim // of links that state none of their own
	Links  []*link.Result
	// Stations are the ends of the links, in the order of the plan, each once.
	Stations []*link.Station
	// Notes hold for the plan as a whole.
	Notes []string
}

// Run computes all links of the plan, on all cores. done, if not nil, is called as links are
// finished, never twice at once. The errors of all links that have no answer come together, each
// with its place in the plan.
func (n *Network) Run(ctx context.Context, done func()) (*Result, error) {
	r := &Result{Title: n.Title, Method: n.Conditions.Method.Edition, Aim: n.plan.Aim.resolve(), Links: make([]*link.Result, len(n.Links))}
	c := &checker{Plan: n.plan}
	var mu sync.Mutex
	work, inner := errgroup.WithContext(ctx)
	work.SetLimit(runtime.GOMAXPROCS(0))
	for i, l := range n.Links {
		work.Go(func() error {
			if inner.Err() != nil {
				return inner.Err()
			}
			result, err := n.Compute(l)
			mu.Lock()
			defer mu.Unlock()
			if err != nil {
				c.refuse(fmt.Sprintf("links[%d]", i), fmt.Errorf("%s to %s: %w", l.From.Name, l.To.Name, err))
			}
			r.Links[i] = result
			if done != nil {
				done()
			}
			return nil
		})
	}
	if err := work.Wait(); err != nil {
		return nil, err
	}
	if len(c.errs) > 0 {
		return nil, c.errs.sorted()
	}
	r.Stations = n.ends()
	return r, n.addInterference(ctx, r)
}

// Compute works out one link, of the plan or of the caller's own making between its stations.
func (n *Network) Compute(l *link.Link) (*link.Result, error) {
	for _, s := range []*link.Station{l.From, l.To} {
		if s.Radio.PowerSource == "" && !(l.OneWay && s == l.To) {
			return nil, &Refusal{fmt.Sprintf("%s transmits on this path, but its radio %q has no power", s.Name, s.Radio.Name), "state its power, or ask the other way"}
		}
	}
	ground, err := n.profile(l.From, l.To)
	if err != nil {
		return nil, err
	}
	return link.Compute(l, ground, n.Conditions)
}

// profile returns the ground between two stations from the one of lower order to the other.
func (n *Network) profile(a, b *link.Station) (terrain.Profile, error) {
	if b.Order < a.Order {
		a, b = b, a
	}
	return n.Ground.Profile(a.At, b.At)
}

// ends lists the stations of the links in the order of the plan.
func (n *Network) ends() []*link.Station {
	var list []*link.Station
	for _, l := range n.Links {
		for _, s := range []*link.Station{l.From, l.To} {
			if !slices.Contains(list, s) {
				list = append(list, s)
			}
		}
	}
	slices.SortStableFunc(list, func(a, b *link.Station) int { return a.Order - b.Order })
	return list
}
