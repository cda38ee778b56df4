package web

import (
	"context"

	"fellreach/link/report"

	"github.com/danielgtaylor/huma/v2"
)

func (s *Server) registerLinks(api huma.API) {
	answer(api, readOperation("readLinks", "/api/links", "All links with their budgets, as `links --format json` prints them"), s.readLinks)
}

func (s *Server) readLinks(ctx context.Context, in *struct{ Versioned }) (report.Links, error) {
	v, err := s.shelf.take(in.Version)
	if err != nil {
		return report.Links{}, err
	}
	defer s.shelf.release(v)
	result, err := v.links(ctx)
	if err != nil {
		return report.Links{}, err
	}
	return report.LinksOf(result), nil
}
