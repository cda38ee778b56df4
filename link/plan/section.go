package plan

import (
	"fmt"
	"slices"
	"strings"

	"fellreach/link"
)

// Section works out the path of a link, of the plan or found by [Network.Named].
func (n *Network) Section(l *link.Link) (*link.Section, error) {
	ground, err := n.profile(l.From, l.To)
	if err != nil {
		return nil, err
	}
	return link.Trace(l, ground, n.Conditions)
}

// Named finds the link that a person names: by its own name, or by its ends as "A..B" in either
// order, where a site may stand for its stations. Ends without a link between them make a path of
// its own, on the channel of the first link of either.
func (n *Network) Named(named string) (*link.Link, error) {
	for _, l := range n.Links {
		if l.Name == named && named != "" {
			return l, nil
		}
	}
	a, b, ok := strings.Cut(named, "..")
	if !ok {
		return nil, &Refusal{fmt.Sprintf("there is no link %q", named), `name a link of the plan, or two ends as "A..B"`}
	}
	from, to := n.called(strings.TrimSpace(a)), n.called(strings.TrimSpace(b))
	if len(from) == 0 || len(to) == 0 {
		return nil, &Refusal{fmt.Sprintf("%q does not name two stations", named), n.stationNames()}
	}
	if from[0].Order == to[0].Order {
		return nil, &Refusal{"both ends stand at one site", "name two sites"}
	}
	found := n.between(from, to)
	switch {
	case len(found) == 1:
		return found[0], nil
	case len(found) == 0 && len(from) == 1 && len(to) == 1:
		return n.ownPath(from[0], to[0])
	case len(found) == 0:
		return nil, &Refusal{fmt.Sprintf("no link runs from site to site in %q", named), "name two stations; " + n.stationNames()}
	}
	var names []string
	for _, l := range found {
		names = append(names, l.Title())
	}
	return nil, &Refusal{fmt.Sprintf("%d links run between %s", len(found), strings.TrimSpace(a)+" and "+strings.TrimSpace(b)), "give the links names in the plan and ask for one of " + strings.Join(names, "; ")}
}

// called lists the stations of a name: one, or all of a site.
func (n *Network) called(name string) []*link.Station {
	if s := n.Stations[name]; s != nil {
		return []*link.Station{s}
	}
	var list []*link.Station
	for full, s := range sorted(n.Stations) {
		if site(full) == name {
			list = append(list, s)
		}
	}
	return list
}

func (n *Network) between(these, those []*link.Station) []*link.Link {
	var found []*link.Link
	for _, l := range n.Links {
		if slices.Contains(these, l.From) && slices.Contains(those, l.To) || slices.Contains(those, l.From) && slices.Contains(these, l.To) {
			found = append(found, l)
		}
	}
	return found
}

// ownPath is a path that the plan has no link for.
func (n *Network) ownPath(from, to *link.Station) (*link.Link, error) {
	l := &link.Link{From: from, To: to, OneWay: true, Aim: link.Aim{AvailabilityPct: 50}}
	for _, s := range []*link.Station{from, to} {
		if i := n.firstLink(s); i >= 0 {
			l.Channel = n.Links[i].Channel
			return l, nil
		}
	}
	if len(n.plan.Channels) > 1 {
		return nil, &Refusal{fmt.Sprintf("%s and %s have no links, and the plan has several channels", from.Name, to.Name), "add the link to the plan with its channel"}
	}
	for name, ch := range n.plan.Channels {
		l.Channel = ch.resolve(name)
	}
	return l, nil
}

func (n *Network) stationNames() string {
	var names []string
	for name := range sorted(n.Stations) {
		names = append(names, name)
	}
	return known(names, "station")
}
