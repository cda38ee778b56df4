package report

import (
	"cmp"
	"fmt"
	"io"
	"math"
	"slices"
	"strings"

	"fellreach/link"
	"fellreach/link/plan"

	"github.com/jedib0t/go-pretty/v6/table"
	"github.com/jedib0t/go-pretty/v6/text"
)

// LinksTable writes the links of a plan as a table for people, then a count of the verdicts and
// the warnings.
func LinksTable(w io.Writer, r *plan.Result) error {
	t := newTable("", "from", "to", "channel", "km", "azimuth", "margin out", "back", "chance", "path")
	for _, l := range r.Links {
		back := "one way"
		if len(l.Directions) > 1 {
			back = marginText(l.Directions[1].MarginDB)
		}
		t.AppendRow(table.Row{
			l.Verdict.Mark() + " " + string(l.Verdict), l.Link.From.Name, l.Link.To.Name, l.Link.Channel.Name, decimals(l.Profile.LengthKm(), 2), azimuth(l.Profile.AzDeg),
			marginText(l.Directions[0].MarginDB), back, percent(l.ChancePct), pathWords(l),
		})
	}
	t.right("km", "azimuth", "margin out", "back", "chance")
	if _, err := fmt.Fprintf(w, "%s\n%s\n\n%s\n\n%s\n", r.Title, aimWords(r), t.Render(), verdictCount(r.Links)); err != nil {
		return err
	}
	if err := writeWarnings(w, r.Links); err != nil {
		return err
	}
	for _, note := range r.Notes {
		if _, err := fmt.Fprintf(w, "note: %s\n", note); err != nil {
			return err
		}
	}
	return nil
}

// aimWords says by what the links are judged.
func aimWords(r *plan.Result) string {
	aim := fmt.Sprintf("a margin of %g dB", r.Aim.MarginDB)
	if r.Aim.ChancePct > 0 {
		aim = fmt.Sprintf("a chance of %g %%", r.Aim.ChancePct)
	}
	return fmt.Sprintf("path by %s; aim: %s at %g %% of an average year, where a link states no other", r.Method, aim, r.Aim.AvailabilityPct)
}

// marginText rounds a margin down, so that none looks better than its verdict.
func marginText(dB float64) string { return signed(math.Floor(dB*10+1e-9)/10, 1) }

// pathWords says in words how freely a path runs.
func pathWords(l *link.Result) string {
	c := l.Clearance
	switch {
	case c.WorstRatio >= 1:
		return "clear"
	case c.WorstRatio >= c.NeededRatio:
		return fmt.Sprintf("clear, %s F1 at %s km", decimals(math.Floor(c.WorstRatio*10)/10, 1), decimals(c.AtKm, 1))
	case c.WorstRatio >= 0:
		return fmt.Sprintf("grazes at %s km", decimals(c.AtKm, 1))
	}
	return fmt.Sprintf("blocked at %s km", decimals(c.AtKm, 1))
}

func verdictCount(links []*link.Result) string {
	count := map[link.Verdict]int{}
	for _, l := range links {
		count[l.Verdict]++
	}
	return fmt.Sprintf("%s: %s, %d thin, %s. Margins in dB, rounded down; azimuths from true north; F1 the first Fresnel radius.",
		counted(len(links), "link", "links"), counted(count[link.Closes], "closes", "close"), count[link.Thin], counted(count[link.Fails], "fails", "fail"))
}

// writeWarnings lists each warning and then each remark once, with the stations or links it
// stands for.
func writeWarnings(w io.Writer, links []*link.Result) error {
	var warnings, remarks remarkList
	for _, l := range links {
		warnings.add(l.Link.Title(), l.Warnings)
		remarks.add(l.Link.Title(), l.Remarks)
	}
	if len(warnings.texts)+len(remarks.texts) == 0 {
		return nil
	}
	_, err := fmt.Fprintf(w, "\n%s%s", warnings.words("warning"), remarks.words("note"))
	return err
}

// A remarkList holds texts in the order they came up, each with its places.
type remarkList struct {
	texts  []string
	places map[string][]string
}

func (r *remarkList) add(title string, list []link.Warning) {
	if r.places == nil {
		r.places = map[string][]string{}
	}
	for _, one := range list {
		place := cmp.Or(one.At, title)
		if r.places[one.Text] == nil {
			r.texts = append(r.texts, one.Text)
		}
		if !slices.Contains(r.places[one.Text], place) {
			r.places[one.Text] = append(r.places[one.Text], place)
		}
	}
}

func (r *remarkList) words(kind string) string {
	var b strings.Builder
	for _, text := range r.texts {
		fmt.Fprintf(&b, "%s: %s\n%s(%s)\n", kind, text, strings.Repeat(" ", len(kind)+2), placeWords(r.places[text]))
	}
	return b.String()
}

// mostPlaces is how many places of a remark a table names.
const mostPlaces = 12

func placeWords(places []string) string {
	if others := len(places) - mostPlaces; others > 1 {
		return fmt.Sprintf("%s and %d others", strings.Join(places[:mostPlaces], ", "), others)
	}
	return strings.Join(places, ", ")
}

// LinesTable writes the whole budget of every link, line by line, and what small changes do to it.
func LinesTable(w io.Writer, r *plan.Result) error {
	for _, l := range r.Links {
		if _, err := fmt.Fprintf(w, "\n%s %s: %s\n", l.Verdict.Mark(), l.Link.Title(), sensitivityWords(l)); err != nil {
			return err
		}
		for _, b := range l.Directions {
			t := newTable("line", "dB", "sum", "kind", "source")
			sum := 0.0
			for _, line := range b.Lines {
				if line.Kind == link.NeedLine {
					t.AppendSeparator()
					t.AppendRow(table.Row{"received at " + b.To, "", decimals(b.ReceivedDBm, 2), "dBm"})
					t.AppendSeparator()
				}
				sum += line.DB
				t.AppendRow(table.Row{line.Name, signed(line.DB, 2), decimals(sum, 2), line.Kind, line.Source})
			}
			t.right("dB", "sum")
			t.wrap("source", 72)
			if _, err := fmt.Fprintf(w, "\n%s → %s at %s MHz: received %s dBm, required %s dBm, margin %s dB\n%s\n",
				b.From, b.To, decimals(b.FreqHz/1e6, 4), decimals(b.ReceivedDBm, 1), decimals(b.RequiredDBm, 1), marginText(b.MarginDB), t.Render()); err != nil {
				return err
			}
		}
	}
	return nil
}

// sensitivityWords says what small changes do to a link.
func sensitivityWords(l *link.Result) string {
	s := l.Sensitivity
	return fmt.Sprintf("1 m more mast at %s gives %s dB, at %s %s dB; ground 4 m higher between them %s dB; 1 dB more gives %s points of chance",
		l.Link.From.Name, signed(s.FromMastDB, 2), l.Link.To.Name, signed(s.ToMastDB, 2), signed(s.RasterDB, 2), signed(s.ChancePct, 1))
}

// A plainTable is a table with a rule under its head and no frame: it stays legible in a terminal
// and in an e-mail.
type plainTable struct {
	table.Writer
	columns []table.ColumnConfig
}

func newTable(head ...string) *plainTable {
	t := &plainTable{Writer: table.NewWriter()}
	row := make(table.Row, len(head))
	for i, h := range head {
		row[i] = h
	}
	t.AppendHeader(row)
	style := table.StyleLight
	style.Options = table.OptionsNoBordersAndSeparators
	style.Options.SeparateHeader = true
	style.Format.Header = text.FormatDefault
	t.SetStyle(style)
	t.SuppressTrailingSpaces()
	return t
}

// right aligns columns of figures.
func (t *plainTable) right(names ...string) {
	for _, name := range names {
		t.columns = append(t.columns, table.ColumnConfig{Name: name, Align: text.AlignRight, AlignHeader: text.AlignRight})
	}
	t.SetColumnConfigs(t.columns)
}

// wrap breaks a column of text between words.
func (t *plainTable) wrap(name string, width int) {
	t.columns = append(t.columns, table.ColumnConfig{Name: name, WidthMax: width, WidthMaxEnforcer: text.WrapSoft})
	t.SetColumnConfigs(t.columns)
}
