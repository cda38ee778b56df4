package propagation

import "math"

// Terms are the intermediates of a method, named by the symbols of Rec. ITU-R P.1812 (P.526 uses a
// part of them). NaN marks a term that the method did not compute; [Terms.List] leaves it out.
type Terms struct {
	// Line of sight: free space, and with focusing for p and for beta0 of the time.
	Lbfs, Lb0p, Lb0beta float64
	// Diffraction at the median radius: Bullington actual and smooth, spherical Earth.
	LbullaK50, LbullsK50, LdsphK50 float64
	// Diffraction at the median radius and at that of beta0, interpolation factor, for p.
	Ld50, Ldbeta, Fi, Ldp float64
	// The same with free space and with line of sight.
	Lbd50, Lbd float64
	// Notional minimum of line of sight and diffraction, ducting, its blend with line of sight.
	Lminb0p, Lba, Lminbap float64
	// Blends of diffraction with ducting and with the minimum.
	Lbda, Lbam float64
	// Troposcatter, all mechanisms, locations, the loss; the field for 1 kW e.r.p., dB(uV/m).
	Lbs, Lbc, Lloc, Lb, Ep float64

	// Path angular distance and horizon elevations, mrad.
	Theta, ThetaT, ThetaR float64
	// Horizon distances, longest stretches of land and of inland, effective Earth radius, km.
	Dlt, Dlr, Dtm, Dlm, Ae float64
	// Smooth surface at the ends for ducting and for diffraction, m above sea level.
	Hst, Hsr, Hstd, Hsrd float64
	// Effective heights and roughness for ducting, m; antennas, m above sea level.
	Hte, Hre, Hm, Hts, Hrs float64
	// Share of the path over sea; time of anomalous propagation, %.
	Omega, Beta0 float64
}

// A Term is one intermediate: the Recommendation's symbol, its unit (empty for a plain number) and
// its value.
type Term struct {
	Symbol, Unit string
	Value        float64
}

// List returns the computed terms in a fixed order: losses, angles, distances, heights, shares.
func (t Terms) List() []Term {
	list := make([]Term, 0, len(symbols))
	for _, s := range symbols {
		if v := *s.in(&t); !math.IsNaN(v) {
			list = append(list, Term{s.symbol, s.unit, v})
		}
	}
	return list
}

// noTerms holds NaN throughout: where every method starts.
var noTerms = func() (t Terms) {
	for _, s := range symbols {
		*s.in(&t) = math.NaN()
	}
	return t
}()

var symbols = [...]struct {
	symbol, unit string
	in           func(*Terms) *float64
}{
	{"Lbfs", "dB", func(t *Terms) *float64 { return &t.Lbfs }},
	{"Lb0p", "dB", func(t *Terms) *float64 { return &t.Lb0p }},
	{"Lb0beta", "dB", func(t *Terms) *float64 { return &t.Lb0beta }},
	{"Lbulla_k50", "dB", func(t *Terms) *float64 { return &t.LbullaK50 }},
	{"Lbulls_k50", "dB", func(t *Terms) *float64 { return &t.LbullsK50 }},
	{"Ldsph_k50", "dB", func(t *Terms) *float64 { return &t.LdsphK50 }},
	{"Ld50", "dB", func(t *Terms) *float64 { return &t.Ld50 }},
	{"Ldbeta", "dB", func(t *Terms) *float64 { return &t.Ldbeta }},
	{"Fi", "", func(t *Terms) *float64 { return &t.Fi }},
	{"Ldp", "dB", func(t *Terms) *float64 { return &t.Ldp }},
	{"Lbd50", "dB", func(t *Terms) *float64 { return &t.Lbd50 }},
	{"Lbd", "dB", func(t *Terms) *float64 { return &t.Lbd }},
	{"Lminb0p", "dB", func(t *Terms) *float64 { return &t.Lminb0p }},
	{"Lba", "dB", func(t *Terms) *float64 { return &t.Lba }},
	{"Lminbap", "dB", func(t *Terms) *float64 { return &t.Lminbap }},
	{"Lbda", "dB", func(t *Terms) *float64 { return &t.Lbda }},
	{"Lbam", "dB", func(t *Terms) *float64 { return &t.Lbam }},
	{"Lbs", "dB", func(t *Terms) *float64 { return &t.Lbs }},
	{"Lbc", "dB", func(t *Terms) *float64 { return &t.Lbc }},
	{"Lloc", "dB", func(t *Terms) *float64 { return &t.Lloc }},
	{"Lb", "dB", func(t *Terms) *float64 { return &t.Lb }},
	{"Ep", "dB(uV/m)", func(t *Terms) *float64 { return &t.Ep }},
	{"theta", "mrad", func(t *Terms) *float64 { return &t.Theta }},
	{"theta_t", "mrad", func(t *Terms) *float64 { return &t.ThetaT }},
	{"theta_r", "mrad", func(t *Terms) *float64 { return &t.ThetaR }},
	{"dlt", "km", func(t *Terms) *float64 { return &t.Dlt }},
	{"dlr", "km", func(t *Terms) *float64 { return &t.Dlr }},
	{"dtm", "km", func(t *Terms) *float64 { return &t.Dtm }},
	{"dlm", "km", func(t *Terms) *float64 { return &t.Dlm }},
	{"ae", "km", func(t *Terms) *float64 { return &t.Ae }},
	{"hst", "m", func(t *Terms) *float64 { return &t.Hst }},
	{"hsr", "m", func(t *Terms) *float64 { return &t.Hsr }},
	{"hstd", "m", func(t *Terms) *float64 { return &t.Hstd }},
	{"hsrd", "m", func(t *Terms) *float64 { return &t.Hsrd }},
	{"hte", "m", func(t *Terms) *float64 { return &t.Hte }},
	{"hre", "m", func(t *Terms) *float64 { return &t.Hre }},
	{"hm", "m", func(t *Terms) *float64 { return &t.Hm }},
	{"hts", "m", func(t *Terms) *float64 { return &t.Hts }},
	{"hrs", "m", func(t *Terms) *float64 { return &t.Hrs }},
	{"omega", "", func(t *Terms) *float64 { return &t.Omega }},
	{"beta0", "%", func(t *Terms) *float64 { return &t.Beta0 }},
}
