package plan

import (
	"path/filepath"
	"strings"
)

// The defaults of a plan, all in one place. Those of the air are the usual mid-latitude values
// of Rec. ITU-R P.453; the rest is common practice, no source.
const (
	defaultN0           = 325.0
	defaultDeltaN       = 45.0
	defaultClearingM    = 50.0
	defaultVelocity     = 0.66
	defaultNoiseFigure  = 7.0
	defaultDutyPct      = 100.0
	defaultAvailability = 99.0
	defaultAimMarginDB  = 6.0
	defaultSpreadDB     = 9.0
	defaultMethod       = "p1812"
	defaultDn1          = -200.0 // inland, temperate; from memory
)

// fillDefaults writes the defaults into what the file left out.
func (p *Plan) fillDefaults() {
	if p.Title == "" {
		p.Title = strings.TrimSuffix(filepath.Base(p.file), filepath.Ext(p.file))
	}
	fill(&p.Air.N0, defaultN0)
	fill(&p.Air.DeltaN, defaultDeltaN)
	fill(&p.Air.Dn1, defaultDn1)
	fill(&p.Ground.BridgeVoids, 0)
	fillText(&p.Ground.Elevation.Holds, "bare")
	fillText(&p.Ground.Beyond, "void")
	fillText(&p.Method, defaultMethod)
	if p.Noise == nil {
		p.Noise = &Noise{Environment: "rural"}
	}
	if p.Prediction == nil {
		p.Prediction = &Prediction{}
	}
	fill(&p.Prediction.Spread, defaultSpreadDB)
	fill(&p.Prediction.Bias, 0)
	if p.Aim == nil {
		p.Aim = &Aim{}
	}
	fill(&p.Aim.Availability, defaultAvailability)
	if p.Aim.Chance == nil {
		fill(&p.Aim.Margin, defaultAimMarginDB)
	}
	for name, f := range p.Feeders {
		fill(&f.VelocityFactor, defaultVelocity)
		p.Feeders[name] = f
	}
	for name, r := range p.Radios {
		fill(&r.Duty, defaultDutyPct)
		if r.Sensitivity != nil {
			fill(&r.NoiseFigure, defaultNoiseFigure)
		}
		p.Radios[name] = r
	}
	for i := range p.Sites {
		fill(&p.Sites[i].Clearing, defaultClearingM)
	}
	for i := range p.Links.List {
		p.Links.List[i].fillDefaults(p)
	}
}

// fillDefaults gives a link the plan's only channel and the plan's aim where it states none.
func (l *Link) fillDefaults(p *Plan) {
	if l.Channel == "" && len(p.Channels) == 1 {
		for name := range p.Channels {
			l.Channel = name
		}
	}
	if l.Aim == nil {
		l.Aim = &Aim{}
	}
	fill(&l.Aim.Availability, *p.Aim.Availability)
	if l.Aim.Chance == nil && l.Aim.Margin == nil {
		l.Aim.Chance, l.Aim.Margin = p.Aim.Chance, p.Aim.Margin
	}
}

func fill[T any](field **T, value T) {
	if *field == nil {
		*field = &value
	}
}

func fillText(field *string, value string) {
	if *field == "" {
		*field = value
	}
}
