package web

import (
	"context"

	"fellreach/link"
	"fellreach/link/report"

	"github.com/danielgtaylor/huma/v2"
)

// A SectionInput asks for the path of a link.
type SectionInput struct {
	Versioned
	Link string `query:"link" required:"true" maxLength:"500" doc:"a link's name, or two ends as A..B" example:"West head..Ormvik/coast"`
}

func (s *Server) registerSection(api huma.API) {
	answer(api, readOperation("readSection", "/api/section", "The ground under a link, as `section --format json` prints it"), func(_ context.Context, in *SectionInput) (report.Section, error) {
		traced, err := s.section(in)
		if err != nil {
			return report.Section{}, err
		}
		return report.SectionOf(traced), nil
	})
}

func (s *Server) section(in *SectionInput) (*link.Section, error) {
	v, err := s.shelf.take(in.Version)
	if err != nil {
		return nil, err
	}
	defer s.shelf.release(v)
	l, err := v.network.Named(in.Link)
	if err != nil {
		return nil, err
	}
	return v.network.Section(l)
}
