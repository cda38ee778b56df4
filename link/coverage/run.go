package coverage

import (
	"context"
	"fmt"
	"io"
	"runtime/debug"

	"fellreach/link"
	"fellreach/terrain/raster"

	"golang.org/x/sync/errgroup"
)

// Options say where results go and who hears of the work.
type Options struct {
	Dir     string
	Outputs Outputs
	Small   bool // compress for small files, not for time
	// SmoothM is how far the outlines of bands may leave the sides of the cells; 0 keeps those.
	SmoothM float64
	// Progress, if not nil, is told for each site how many of its radials are done, from several
	// goroutines; Note what else a person should know.
	Progress func(site string, done, total int)
	Note     func(text string)
}

// A runner maps sites into a folder.
type runner struct {
	Options
	ground      *raster.Ground
	folder      folder
	fingerprint string
	sites       []Site
	members     []member
	changed     bool // some site was mapped in this run
}

// Run maps all sites into a folder and writes cover.json there. A site that an earlier run finished
// there, with the same input, is kept. An error leaves the sites that were finished.
func Run(ctx context.Context, ground *raster.Ground, title string, sites []Site, o Options) (*Report, error) {
	r := &runner{Options: o, ground: ground, sites: sites}
	var err error
	if r.folder, err = openFolder(o.Dir, o.Small); err != nil {
		return nil, err
	}
	if r.fingerprint, err = ground.Fingerprint(); err != nil {
		return nil, err
	}
	report := &Report{Title: title, Sites: []SiteReport{}}
	for i := range sites {
		site, err := r.site(ctx, i)
		if err != nil {
			return nil, fmt.Errorf("%s: %w", sites[i].Name, err)
		}
		report.Sites = append(report.Sites, site)
	}
	if r.networked() {
		if report.Network, err = r.network(); err != nil {
			return nil, err
		}
	}
	if err := r.writePackage(); err != nil {
		return nil, err
	}
	return report, r.folder.writeJSON("cover.json", report)
}

// writePackage gathers all bands in one GeoPackage.
func (r *runner) writePackage() error {
	const name = "layers.gpkg"
	if !r.Outputs.Bands || !r.changed && r.folder.has([]string{name}) {
		return nil
	}
	var layers []raster.VectorLayer
	for i := range r.sites {
		layers = append(layers, raster.VectorLayer{Name: r.slug(i), GeoJSON: r.folder.path(r.name("bands", i, ".geojson"))})
	}
	if r.networked() {
		layers = append(layers, raster.VectorLayer{Name: "network", GeoJSON: r.folder.path("bands-network.geojson")})
	}
	return raster.WriteGeoPackage(r.folder.path(name), layers)
}

// networked says whether the sites are joined.
func (r *runner) networked() bool { return r.Outputs.Network && len(r.sites) > 1 }

// layers are what has to be computed for the outputs.
func (r *runner) layers() Layers {
	o := r.Outputs
	return Layers{
		Loss:   o.Loss,
		Margin: o.Margin || o.Bands || o.Picture || o.Network,
		Field:  o.Field || r.networked(),
	}
}

// name is the file of a kind of result of a site.
func (r *runner) name(kind string, number int, extension string) string {
	return kind + "-" + r.slug(number) + extension
}

// slug keeps apart sites whose names differ in what file names leave out, and several maps of one.
func (r *runner) slug(number int) string {
	slug, same := r.sites[number].slug(), 1
	for i := range number {
		if r.sites[i].slug() == slug {
			same++
		}
	}
	if same > 1 {
		return fmt.Sprintf("%s-%d", slug, same)
	}
	return slug
}

// files are the files of a site.
func (r *runner) files(number int) (names []string) {
	o := r.Outputs
	for _, f := range []struct {
		on              bool
		kind, extension string
	}{{o.Loss, "loss", ".tif"}, {o.Margin, "margin", ".tif"}, {o.Field, "field", ".tif"}, {o.Bands, "bands", ".geojson"}, {o.Picture, "picture", ".png"}} {
		if f.on {
			names = append(names, r.name(f.kind, number, f.extension))
		}
	}
	return names
}

// site maps a site, or finds it mapped.
func (r *runner) site(ctx context.Context, number int) (SiteReport, error) {
	s := &r.sites[number]
	places, err := link.NewPlaces(s.Task.Link, s.Task.Conditions)
	if err != nil {
		return SiteReport{}, err
	}
	digest := s.digest(places, fmt.Sprintln(r.fingerprint, r.Outputs, r.Small, r.SmoothM))
	if report, ok := r.folder.done(r.slug(number), digest, r.files(number)); ok && r.recall(number) == nil {
		if r.Note != nil {
			r.Note(s.Name + ": kept from an earlier run")
		}
		return report, nil
	}
	if err := r.folder.forget(r.slug(number)); err != nil {
		return SiteReport{}, err
	}
	r.changed = true
	m, err := Compute(ctx, r.ground, s.Task, r.layers(), func(done, total int) {
		if r.Progress != nil {
			r.Progress(s.Name, done, total)
		}
	})
	if err != nil {
		return SiteReport{}, err
	}
	if !r.Outputs.Picture {
		m.disc = nil
	}
	debug.FreeOSMemory() // of the ground and the lists of cells, before GDAL takes as much
	report, err := r.writeSite(number, m)
	if err != nil {
		return SiteReport{}, err
	}
	r.remember(number, m.Frame, m.MarginDB, m.FieldDBuV)
	return report, r.folder.setDone(r.slug(number), digest, report)
}

func (r *runner) remember(number int, frame *raster.Frame, marginDB, fieldDBuV []float32) {
	if r.networked() {
		s := &r.sites[number]
		r.members = append(r.members, member{s.Name, frame, marginDB, fieldDBuV, s.AimDB, s.Task.Link.Channel.OutHz})
	}
}

// recall reads back what the network needs of a site that is done.
func (r *runner) recall(number int) error {
	if !r.networked() {
		return nil
	}
	t := &r.sites[number].Task
	frame, err := r.ground.Frame(t.Link.From.At, t.RangeM, t.CellM)
	if err != nil {
		return err
	}
	margin, err := raster.ReadCOG(r.folder.path(r.name("margin", number, ".tif")), frame)
	if err != nil {
		return err
	}
	field, err := raster.ReadCOG(r.folder.path(r.name("field", number, ".tif")), frame)
	if err != nil {
		return err
	}
	r.remember(number, frame, margin, field)
	return nil
}

// leastPatch is the size in cells below which a patch is left out of the bands' outlines; the areas
// count every cell.
const leastPatch = 8

// writeSite writes the files of a site, several at once.
func (r *runner) writeSite(number int, m *Map) (SiteReport, error) {
	s, o := &r.sites[number], r.Outputs
	bands := []Band{}
	var work errgroup.Group
	write := func(on bool, kind string, cells []float32, unit, about string) {
		if on {
			work.Go(func() error {
				return r.folder.writeMap(r.name(kind, number, ".tif"), m.Frame, cells, unit, about)
			})
		}
	}
	write(o.Loss, "loss", m.LossDB, "dB", fmt.Sprintf("Basic transmission loss from %s at %g MHz, half of time and locations, %s", s.Name, s.Task.Link.Channel.OutHz/1e6, s.Task.Conditions.Method.Edition))
	write(o.Margin, "margin", m.MarginDB, "dB", fmt.Sprintf("Margin with %s, the smaller of both directions, for %g %% of the year and %g %% of locations", s.Name, s.Task.Link.Aim.AvailabilityPct, s.Task.LocationsPct))
	write(o.Field, "field", m.FieldDBuV, "dB(uV/m)", fmt.Sprintf("Field strength of %s at %g MHz, half of time and locations", s.Name, s.Task.Link.Channel.OutHz/1e6))
	if m.MarginDB != nil {
		classes := classify(m.MarginDB, s.BandsDB)
		bands = measure(classes, m.Frame, s.BandsDB)
		if o.Bands {
			work.Go(func() error {
				return r.writeBands(r.name("bands", number, ".geojson"), s.Name, m.Frame, classes, bands)
			})
		}
		if o.Picture {
			work.Go(func() error {
				return r.folder.write(r.name("picture", number, ".png"), func(w io.Writer) error { return m.picture(w, s.BandsDB) })
			})
		}
	}
	return s.report(m, bands), work.Wait()
}

func (r *runner) writeBands(file, name string, f *raster.Frame, classes []uint8, bands []Band) error {
	patches := patchesOf(classes, f.Cols, f.Rows, leastPatch)
	return r.folder.write(file, func(w io.Writer) error { return writeBands(w, name, f, patches, bands, r.SmoothM/f.CellM) })
}

// network joins the sites and writes the layers.
func (r *runner) network() (*NetworkReport, error) {
	n, err := join(r.members)
	if err != nil {
		return nil, err
	}
	centre, err := n.frame.Centre()
	if err != nil {
		return nil, err
	}
	if err := n.frame.SetPlane(centre); err != nil {
		return nil, err
	}
	report := &NetworkReport{}
	legend := ""
	for i := range r.sites {
		report.Sites = append(report.Sites, r.sites[i].Name)
		legend += fmt.Sprintf("; %d %s", i+1, r.sites[i].Name)
	}
	bandsDB := r.sites[0].BandsDB
	classes := classify(n.bestDB, bandsDB)
	report.Bands = measure(classes, n.frame, bandsDB)
	report.Covered = n.covered(len(r.sites))
	for _, layer := range []struct {
		name        string
		cells       []float32
		unit, about string
	}{
		{"margin", n.bestDB, "dB", "Best margin of all sites"},
		{"server", n.server, "", "Site of the best margin" + legend},
		{"count", n.count, "", "Number of sites whose margin reaches the aim"},
		{"ratio", n.ratioDB, "dB", "Median level of the serving site over the strongest other one on its frequency"},
	} {
		if err := r.folder.writeMap("network-"+layer.name+".tif", n.frame, layer.cells, layer.unit, layer.about); err != nil {
			return nil, err
		}
	}
	return report, r.writeBands("bands-network.geojson", "network", n.frame, classes, report.Bands)
}

// covered measures the areas in which 1, 2, ... sites reach their aim.
func (n *network) covered(sites int) (shares []Share) {
	steps := []float64{}
	for i := range sites {
		steps = append(steps, float64(i+1))
	}
	for i, b := range measure(classify(n.count, steps), n.frame, steps) {
		shares = append(shares, Share{i + 1, b.AreaKm2})
	}
	return shares
}
