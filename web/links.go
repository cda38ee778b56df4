package web

import (
	"context"

	"fellreach/link"
	"fellreach/link/plan"
	"fellreach/link/report"

	"github.com/danielgtaylor/huma/v2"
)

// A linksInput asks for links.
type linksInput struct {
	Versioned
	Link string `query:"link" maxLength:"500" doc:"only this link, by its name or as A..B; interference is then not looked at"`
}

func (s *Server) registerLinks(api huma.API) {
	answer(api, readOperation("readLinks", "/api/links", "All links with their budgets, as links --format json prints them"), s.readLinks)
}

func (s *Server) readLinks(ctx context.Context, in *linksInput) (report.Links, error) {
	v, err := s.shelf.take(in.Version)
	if err != nil {
		return report.Links{}, err
	}
	defer s.shelf.release(v)
	return v.answer(ctx, in.Link)
}

// answer returns all links of a version, or the one that is named.
func (v *version) answer(ctx context.Context, named string) (report.Links, error) {
	if named == "" {
		result, err := v.links(ctx)
		if err != nil {
			return report.Links{}, err
		}
		return report.LinksOf(result), nil
	}
	l, err := v.network.Named(named)
	if err != nil {
		return report.Links{}, err
	}
	result, err := v.network.Compute(l)
	if err != nil {
		return report.Links{}, err
	}
	return report.LinksOf(&plan.Result{Title: v.network.Title, Links: []*link.Result{result}}), nil
}
