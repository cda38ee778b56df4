package report

import (
	"encoding/csv"
	"fmt"
	"io"

	"fellreach/link/plan"
)

// LinksCSV writes one row for each direction of each link.
func LinksCSV(w io.Writer, r *plan.Result) error {
	out := csv.NewWriter(w)
	out.Write([]string{
		"link_from", "link_to", "channel", "verdict", "link_margin_db", "chance", "distance_km", "from", "to", "azimuth_deg", "frequency_hz",
		"margin_db", "received_dbm", "required_dbm", "transmission_loss_db", "fade_db", "departure_deg", "arrival_deg",
	})
	for _, l := range r.Links {
		azimuths := []float64{l.Profile.AzDeg, l.Profile.BackAzDeg}
		for i, b := range l.Directions {
			out.Write([]string{
				l.Link.From.Name, l.Link.To.Name, l.Link.Channel.Name, string(l.Verdict), decimals(l.MarginDB, 2), decimals(l.ChancePct/100, 4), decimals(l.Profile.LengthKm(), 4),
				b.From, b.To, decimals(azimuths[i], 3), fmt.Sprintf("%.0f", b.FreqHz),
				decimals(b.MarginDB, 2), decimals(b.ReceivedDBm, 2), decimals(b.RequiredDBm, 2), decimals(b.TransmissionLossDB, 2), decimals(b.FadeDB, 2), decimals(b.DepartureDeg, 3), decimals(b.ArrivalDeg, 3),
			})
		}
	}
	out.Flush()
	return out.Error()
}
