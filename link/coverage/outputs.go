package coverage

import "fmt"

// Outputs say which files are wanted.
type Outputs struct{ Loss, Margin, Field, Bands, Network, Picture bool }

// allOutputs are all of them.
var allOutputs = Outputs{true, true, true, true, true, true}

// ParseOutputs reads a list of "loss", "margin", "field", "bands", "network" and "picture"; an empty
// list means all.
func ParseOutputs(names []string) (Outputs, error) {
	if len(names) == 0 {
		return allOutputs, nil
	}
	var o Outputs
	for _, name := range names {
		wanted := o.named(name)
		if wanted == nil {
			return o, fmt.Errorf("%q is none of loss, margin, field, bands, network, picture", name)
		}
		*wanted = true
	}
	return o, nil
}

// named is the output of a name, nil where there is none.
func (o *Outputs) named(name string) *bool {
	switch name {
	case "loss":
		return &o.Loss
	case "margin":
		return &o.Margin
	case "field":
		return &o.Field
	case "bands":
		return &o.Bands
	case "network":
		return &o.Network
	case "picture":
		return &o.Picture
	}
	return nil
}
