package web

import (
	"bytes"
	"context"
	"fmt"
	"io"
	"net/http"
	"path/filepath"
	"strings"

	"fellreach/link/plan"
	"fellreach/link/report"

	"github.com/danielgtaylor/huma/v2"
)

// A file is an answer to be kept, or a layer for a map.
type file struct {
	ContentType string `header:"Content-Type"`
	Disposition string `header:"Content-Disposition"`
	Body        []byte
}

// mediaTypes are those of the formats that a file can be asked in.
var mediaTypes = map[string]string{
	"txt": "text/plain; charset=utf-8", "csv": "text/csv; charset=utf-8", "json": "application/json", "geojson": "application/geo+json",
	"svg": "image/svg+xml", "yaml": "application/yaml", "tif": "image/tiff; application=geotiff",
}

// newFile names a file after the plan and fills it.
func (s *Server) newFile(what, format string, fill func(io.Writer) error) (*file, error) {
	var b bytes.Buffer
	if err := fill(&b); err != nil {
		return nil, asProblem(err)
	}
	name := strings.TrimSuffix(filepath.Base(s.shelf.path), filepath.Ext(s.shelf.path))
	if what != "" {
		name += "-" + what
	}
	return &file{mediaTypes[format], fmt.Sprintf("attachment; filename=%q", plainName(name)+"."+format), b.Bytes()}, nil
}

// plainName leaves letters and digits of a name, dashes for all else.
func plainName(name string) string {
	fields := strings.FieldsFunc(strings.ToLower(name), func(r rune) bool { return (r < 'a' || r > 'z') && (r < '0' || r > '9') })
	return strings.Join(fields, "-")
}

// fileOperation describes a download.
func fileOperation(id, path, summary string, formats ...string) huma.Operation {
	op := readOperation(id, path, summary)
	content := map[string]*huma.MediaType{}
	for _, format := range formats {
		kind, _, _ := strings.Cut(mediaTypes[format], ";")
		content[kind] = &huma.MediaType{Schema: &huma.Schema{Type: huma.TypeString}}
	}
	op.Responses = map[string]*huma.Response{"200": {Description: http.StatusText(http.StatusOK), Content: content}}
	return op
}

func (s *Server) registerFiles(api huma.API) {
	huma.Register(api, fileOperation("downloadPlan", "/api/files/plan.yaml", "The plan's text as a file", "yaml"), s.planFile)
	huma.Register(api, fileOperation("downloadLinks", "/api/files/links.{format}", "The links as a file", "txt", "csv", "json", "geojson"), s.linksFile)
	huma.Register(api, fileOperation("downloadSection", "/api/files/section.{format}", "The ground under a link as a file", "txt", "csv", "json", "geojson", "svg"), s.sectionFile)
	huma.Register(api, fileOperation("downloadAntenna", "/api/files/antenna.{format}", "An antenna as installed as a file", "txt", "json"), s.antennaFile)
	huma.Register(api, fileOperation("downloadPattern", "/api/files/pattern.svg", "A picture of an antenna's pattern", "svg"), func(_ context.Context, in *AntennaInput) (*file, error) {
		return s.antennaPicture(in, "pattern", report.PatternSVG)
	})
	huma.Register(api, fileOperation("downloadVSWR", "/api/files/vswr.svg", "A picture of an antenna's VSWR over frequency", "svg"), func(_ context.Context, in *AntennaInput) (*file, error) {
		in.Curve = true
		return s.antennaPicture(in, "vswr", report.VSWRSVG)
	})
}

func (s *Server) planFile(_ context.Context, in *struct{ Versioned }) (*file, error) {
	v, err := s.shelf.take(in.Version)
	if err != nil {
		return nil, asProblem(err)
	}
	defer s.shelf.release(v)
	return s.newFile("", "yaml", func(w io.Writer) error {
		_, err := w.Write(v.text)
		return err
	})
}

func (s *Server) linksFile(ctx context.Context, in *struct {
	Format string `path:"format" enum:"txt,csv,json,geojson" example:"csv"`
	Versioned
},
) (*file, error) {
	v, err := s.shelf.take(in.Version)
	if err != nil {
		return nil, asProblem(err)
	}
	defer s.shelf.release(v)
	result, err := v.links(ctx)
	if err != nil {
		return nil, asProblem(err)
	}
	return s.newFile("links", in.Format, func(w io.Writer) error {
		if err := report.WriteLinks(w, result, in.Format); err != nil || in.Format != "txt" {
			return err
		}
		return report.LinesTable(w, result)
	})
}

func (s *Server) sectionFile(_ context.Context, in *struct {
	Format string `path:"format" enum:"txt,csv,json,geojson,svg" example:"svg"`
	SectionInput
},
) (*file, error) {
	traced, err := s.section(&in.SectionInput)
	if err != nil {
		return nil, asProblem(err)
	}
	return s.newFile("section "+traced.Link.From.Name+" "+traced.Link.To.Name, in.Format, func(w io.Writer) error { return report.WriteSection(w, traced, in.Format) })
}

func (s *Server) antennaFile(_ context.Context, in *struct {
	Format string `path:"format" enum:"txt,json" example:"txt"`
	AntennaInput
},
) (*file, error) {
	found, err := s.antenna(&in.AntennaInput)
	if err != nil {
		return nil, asProblem(err)
	}
	return s.newFile("antenna "+found.Name, in.Format, func(w io.Writer) error {
		if in.Format == "json" {
			return report.AntennaJSON(w, found)
		}
		return report.AntennaTable(w, found)
	})
}

// antennaPicture draws an antenna; the picture's azimuth 0 is its facing.
func (s *Server) antennaPicture(in *AntennaInput, what string, draw func(io.Writer, *plan.AntennaResult) error) (*file, error) {
	found, err := s.antenna(in)
	if err != nil {
		return nil, asProblem(err)
	}
	found.Mount.FacingDeg = 0
	return s.newFile(what+" "+found.Name, "svg", func(w io.Writer) error { return draw(w, found) })
}
