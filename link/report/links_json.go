package report

import (
	"encoding/json"
	"io"

	"fellreach/link"
	"fellreach/link/plan"
)

// Links is the links of a plan with their budgets, as JSON holds them: in full precision, the chance
// a fraction of one.
type Links struct {
	Title string     `json:"title"`
	Links []linkJSON `json:"links"`
	Notes []string   `json:"notes,omitempty"`
}

type linkJSON struct {
	Name        string          `json:"name,omitempty"`
	From        string          `json:"from"`
	To          string          `json:"to"`
	Channel     string          `json:"channel"`
	DistanceKm  float64         `json:"distance_km"`
	AzimuthDeg  float64         `json:"azimuth_deg"`
	BackAzDeg   float64         `json:"back_azimuth_deg"`
	Verdict     link.Verdict    `json:"verdict" enum:"closes,thin,fails"`
	MarginDB    float64         `json:"margin_db"`
	Chance      float64         `json:"chance"`
	Clearance   clearanceJSON   `json:"clearance"`
	Sensitivity sensitivityJSON `json:"sensitivity"`
	Warnings    []string        `json:"warnings"`
	Notes       []string        `json:"notes"`
	Directions  []directionJSON `json:"directions"`
}

type clearanceJSON struct {
	WorstRatio  float64 `json:"worst_ratio"`
	AtKm        float64 `json:"at_km"`
	NeededRatio float64 `json:"needed_ratio"`
}

// sensitivityJSON is what small changes do to the link: margins in dB, the chance as a fraction.
type sensitivityJSON struct {
	FromMast1mDB float64 `json:"from_mast_1m_db"`
	ToMast1mDB   float64 `json:"to_mast_1m_db"`
	Ground4mDB   float64 `json:"ground_4m_higher_db"`
	Chance1DB    float64 `json:"chance_of_1_db"`
}

type directionJSON struct {
	From               string     `json:"from"`
	To                 string     `json:"to"`
	FrequencyHz        float64    `json:"frequency_hz"`
	MarginDB           float64    `json:"margin_db"`
	ReceivedDBm        float64    `json:"received_dbm"`
	RequiredDBm        float64    `json:"required_dbm"`
	TransmissionLossDB float64    `json:"transmission_loss_db"`
	FadeDB             float64    `json:"fade_db"`
	DepartureDeg       float64    `json:"departure_deg"`
	ArrivalDeg         float64    `json:"arrival_deg"`
	Lines              []lineJSON `json:"lines"`
}

type lineJSON struct {
	Name    string    `json:"name"`
	ValueDB float64   `json:"value_db"`
	Kind    link.Kind `json:"kind" enum:"power,gain,loss,noise,need,allowance"`
	Source  string    `json:"source"`
}

// LinksJSON writes the links of a plan as [LinksOf] gives them.
func LinksJSON(w io.Writer, r *plan.Result) error { return indented(w, LinksOf(r)) }

// LinksOf returns the links of a plan as JSON holds them.
func LinksOf(r *plan.Result) Links {
	out := Links{Title: r.Title, Links: make([]linkJSON, len(r.Links)), Notes: r.Notes}
	for i, l := range r.Links {
		out.Links[i] = linkOf(l)
	}
	return out
}

func linkOf(r *link.Result) linkJSON {
	out := linkJSON{
		Name: r.Link.Name, From: r.Link.From.Name, To: r.Link.To.Name, Channel: r.Link.Channel.Name,
		DistanceKm: r.Profile.LengthKm(), AzimuthDeg: r.Profile.AzDeg, BackAzDeg: r.Profile.BackAzDeg,
		Verdict: r.Verdict, MarginDB: r.MarginDB, Chance: r.ChancePct / 100,
		Clearance:   clearanceJSON{r.Clearance.WorstRatio, r.Clearance.AtKm, r.Clearance.NeededRatio},
		Sensitivity: sensitivityJSON{r.Sensitivity.FromMastDB, r.Sensitivity.ToMastDB, r.Sensitivity.RasterDB, r.Sensitivity.ChancePct / 100},
		Warnings:    []string{},
		Notes:       []string{},
	}
	for _, w := range r.Warnings {
		out.Warnings = append(out.Warnings, w.String())
	}
	for _, n := range r.Remarks {
		out.Notes = append(out.Notes, n.String())
	}
	for _, b := range r.Directions {
		d := directionJSON{
			From: b.From, To: b.To, FrequencyHz: b.FreqHz, MarginDB: b.MarginDB, ReceivedDBm: b.ReceivedDBm, RequiredDBm: b.RequiredDBm,
			TransmissionLossDB: b.TransmissionLossDB, FadeDB: b.FadeDB, DepartureDeg: b.DepartureDeg, ArrivalDeg: b.ArrivalDeg,
		}
		for _, l := range b.Lines {
			d.Lines = append(d.Lines, lineJSON{l.Name, l.DB, l.Kind, l.Source})
		}
		out.Directions = append(out.Directions, d)
	}
	return out
}

func indented(w io.Writer, v any) error {
	e := json.NewEncoder(w)
	e.SetIndent("", "  ")
	e.SetEscapeHTML(false)
	return e.Encode(v)
}
