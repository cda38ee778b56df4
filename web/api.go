package web

import (
	"context"
	"encoding/json"
	"fmt"
	"math"
	"net/http"
	"reflect"
	"strings"

	"github.com/danielgtaylor/huma/v2"
	"github.com/danielgtaylor/huma/v2/adapters/humachi"
	"github.com/go-chi/chi/v5"
)

// serveAPI puts the operations on a router, and their description.
func (s *Server) serveAPI(r chi.Router) error {
	config := huma.DefaultConfig("Fellreach", "1")
	config.Info.Description = "Plans VHF and UHF radio links on real ground. Keys end in their unit; levels and figures are in full precision. " +
		"`version` names a text of the plan: that of the file where it is left out, or one that was read or tried before."
	config.OpenAPIPath, config.DocsPath, config.SchemasPath, config.CreateHooks = "", "", "", nil
	config.RejectUnknownQueryParameters = true
	config.Components.Schemas = huma.NewMapRegistry("#/components/schemas/", schemaName)
	api := humachi.New(r, config)
	s.registerPlan(api)
	s.registerLinks(api)
	s.registerTry(api)
	s.registerSection(api)
	s.registerAntenna(api)
	s.registerHeights(api)
	s.registerGround(api)
	s.registerCover(api)
	s.registerLayers(api)
	s.registerPlace(api)
	s.registerFiles(api)
	s.api = api.OpenAPI()
	describe(s.api)
	text, err := json.Marshal(s.api)
	if err != nil {
		return err
	}
	r.Get("/api/openapi.json", func(w http.ResponseWriter, _ *http.Request) {
		w.Header().Set("Content-Type", "application/openapi+json")
		_, _ = w.Write(text)
	})
	return nil
}

// schemaName names a schema by its Go type, without the mark of a type that is there for JSON alone.
func schemaName(t reflect.Type, hint string) string {
	return strings.TrimSuffix(huma.DefaultSchemaNamer(t, hint), "JSON")
}

// describe finishes the description: lists of any length are never null, and everything that goes
// wrong is a [Problem].
func describe(doc *huma.OpenAPI) {
	schemas := doc.Components.Schemas
	problems := schemas.Schema(reflect.TypeFor[Problem](), true, "")
	for _, item := range doc.Paths {
		for _, op := range []*huma.Operation{item.Get, item.Put, item.Post, item.Delete} {
			if op == nil {
				continue
			}
			for status, response := range op.Responses {
				if status == "default" || status >= "400" {
					response.Content = map[string]*huma.MediaType{"application/problem+json": {Schema: problems}}
				}
			}
		}
	}
	delete(schemas.Map(), "ErrorModel")
	delete(schemas.Map(), "ErrorDetail")
	for _, schema := range schemas.Map() {
		for _, property := range schema.Properties {
			if property.Type == huma.TypeArray && property.MaxItems == nil {
				property.Nullable = false
			}
		}
	}
}

// An answered is a JSON answer.
type answered[T any] struct{ Body T }

// A readOperation describes a call that changes nothing.
func readOperation(id, path, summary string) huma.Operation {
	return huma.Operation{OperationID: id, Method: http.MethodGet, Path: path, Summary: summary}
}

// sendOperation describes a call with a body, of which it gives an example.
func sendOperation(id, method, path, summary string, example any) huma.Operation {
	return huma.Operation{
		OperationID: id, Method: method, Path: path, Summary: summary, MaxBodyBytes: maxBodyBytes, BodyReadTimeout: readTimeout,
		RequestBody: &huma.RequestBody{Content: map[string]*huma.MediaType{"application/json": {Example: example}}},
	}
}

// answer registers an operation whose errors come from below.
func answer[I, O any](api huma.API, op huma.Operation, handle func(context.Context, *I) (O, error)) {
	huma.Register(api, op, func(ctx context.Context, in *I) (*answered[O], error) {
		err := finite(in)
		if err != nil {
			return nil, err
		}
		out, err := handle(ctx, in)
		if err != nil {
			return nil, asProblem(err)
		}
		return &answered[O]{out}, nil
	})
}

// finite refuses numbers of a query that are none: limits let NaN through.
func finite(in any) error {
	v := reflect.ValueOf(in).Elem()
	for i := range v.NumField() {
		if f := v.Field(i); f.Kind() == reflect.Float64 && (math.IsNaN(f.Float()) || math.IsInf(f.Float(), 0)) {
			return problem(http.StatusUnprocessableEntity, fmt.Sprintf("%s is %g, which is no number to compute with", v.Type().Field(i).Tag.Get("query"), f.Float()))
		}
	}
	return nil
}

// A Versioned request may name the version of the plan that it asks.
type Versioned struct {
	Version string `query:"version" maxLength:"64" doc:"version of the plan; that of the file when left out"`
}
