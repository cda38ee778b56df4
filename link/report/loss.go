package report

import (
	"fmt"
	"io"

	"fellreach/link/propagation"

	"github.com/jedib0t/go-pretty/v6/table"
)

type lossJSON struct {
	LossDB   float64            `json:"loss_db"`
	Method   string             `json:"method"`
	Edition  string             `json:"edition"`
	Warnings []string           `json:"warnings"`
	Terms    map[string]float64 `json:"terms"`
}

// LossJSON writes the answer of a path method in full precision; the keys of the terms are the
// Recommendation's symbols.
func LossJSON(w io.Writer, m propagation.Model, l propagation.Loss) error {
	out := lossJSON{l.DB, m.Name, m.Edition, append([]string{}, l.Notes...), map[string]float64{}}
	for _, t := range l.Terms.List() {
		out.Terms[t.Symbol] = t.Value
	}
	return indented(w, out)
}

// LossTable writes the answer of a path method for people.
func LossTable(w io.Writer, m propagation.Model, l propagation.Loss) error {
	t := newTable("term", "value", "unit")
	for _, term := range l.Terms.List() {
		t.AppendRow(table.Row{term.Symbol, decimals(term.Value, 3), term.Unit})
	}
	t.right("value")
	_, err := fmt.Fprintf(w, "basic transmission loss %s dB by %s (%s)\n\n%s\n", decimals(l.DB, 2), m.Name, m.Edition, t.Render())
	for _, note := range l.Notes {
		if err == nil {
			_, err = fmt.Fprintf(w, "warning: %s\n", note)
		}
	}
	return err
}
