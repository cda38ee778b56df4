package plan

import (
	"errors"
	"fmt"
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
// order. Ends without a link between them make a path of its own on the plan's only channel.
func (n *Network) Named(named string) (*link.Link, error) {
	for _, l := range n.Links {
		if l.Name == named {
			return l, nil
		}
	}
	a, b, ok := strings.Cut(named, "..")
	if !ok {
		return nil, &hinted{fmt.Sprintf("there is no link %q", named), `name a link of the plan, or two ends as "A..B"`}
	}
	from, to := n.Stations[strings.TrimSpace(a)], n.Stations[strings.TrimSpace(b)]
	if from == nil || to == nil {
		return nil, &hinted{fmt.Sprintf("%q does not name two stations", named), n.stationNames()}
	}
	if from.Order == to.Order {
		return nil, errors.New("both ends stand at one site")
	}
	found := n.between(from, to)
	switch len(found) {
	case 0:
		return n.ownPath(from, to)
	case 1:
		return found[0], nil
	}
	var names []string
	for _, l := range found {
		names = append(names, l.Title())
	}
	return nil, &hinted{fmt.Sprintf("%d links run between %s and %s", len(found), from.Name, to.Name), "give the links names in the plan and ask for one of " + strings.Join(names, "; ")}
}

func (n *Network) between(a, b *link.Station) []*link.Link {
	var found []*link.Link
	for _, l := range n.Links {
		if (l.From == a && l.To == b) || (l.From == b && l.To == a) {
			found = append(found, l)
		}
	}
	return found
}

// ownPath is a path that the plan has no link for, on the plan's only channel.
func (n *Network) ownPath(from, to *link.Station) (*link.Link, error) {
	if len(n.plan.Channels) > 1 {
		return nil, &hinted{fmt.Sprintf("no link runs between %s and %s, and the plan has several channels", from.Name, to.Name), "add the link to the plan with its channel"}
	}
	l := &link.Link{From: from, To: to, OneWay: true, Aim: link.Aim{AvailabilityPct: 50}}
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
