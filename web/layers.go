package web

import (
	"context"
	"io"

	"fellreach/link/plan"
	"fellreach/link/report"

	"github.com/danielgtaylor/huma/v2"
	"github.com/paulmach/orb/geojson"
)

func (s *Server) registerLayers(api huma.API) {
	huma.Register(api, fileOperation("readSitesLayer", "/api/layers/sites", "All sites as points", "geojson"), s.sitesLayer)
	huma.Register(api, fileOperation("readLinksLayer", "/api/layers/links", "The links as lines with their verdicts, their stations as points", "geojson"), s.linksLayer)
	huma.Register(api, fileOperation("readSectionLayer", "/api/layers/section", "The path of a link, its ends and its worst point", "geojson"), s.sectionLayer)
}

// sitesLayer holds every site, with links or without.
func (s *Server) sitesLayer(_ context.Context, in *struct{ Versioned }) (*file, error) {
	v, err := s.shelf.take(in.Version)
	if err != nil {
		return nil, asProblem(err)
	}
	defer s.shelf.release(v)
	return s.newFile("sites", "geojson", func(w io.Writer) error { return writeSites(w, v.network) })
}

func writeSites(w io.Writer, n *plan.Network) error {
	all := geojson.NewFeatureCollection()
	for i := range n.Plan().Sites {
		site := siteOf(n, i)
		f := geojson.NewFeature(n.Place(i))
		f.Properties = geojson.Properties{"kind": "site", "name": site.Name, "decimal": site.Place.Decimal, "stations": len(site.Stations)}
		if site.GroundM != nil {
			f.Properties["ground_m"] = *site.GroundM
		}
		if site.Mast != nil {
			f.Properties["mast_m"] = site.Mast.HeightM
		}
		all.Append(f)
	}
	text, err := all.MarshalJSON()
	if err != nil {
		return err
	}
	_, err = w.Write(text)
	return err
}

func (s *Server) linksLayer(ctx context.Context, in *struct{ Versioned }) (*file, error) {
	v, err := s.shelf.take(in.Version)
	if err != nil {
		return nil, asProblem(err)
	}
	defer s.shelf.release(v)
	result, err := v.links(ctx)
	if err != nil {
		return nil, asProblem(err)
	}
	return s.newFile("links", "geojson", func(w io.Writer) error { return report.LinksGeoJSON(w, result) })
}

func (s *Server) sectionLayer(_ context.Context, in *SectionInput) (*file, error) {
	traced, err := s.section(in)
	if err != nil {
		return nil, asProblem(err)
	}
	return s.newFile("section", "geojson", func(w io.Writer) error { return report.SectionGeoJSON(w, traced) })
}
