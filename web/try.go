package web

import (
	"context"
	"encoding/json"
	"net/http"

	"fellreach/link/plan"
	"fellreach/link/report"

	"github.com/danielgtaylor/huma/v2"
)

// An EditBody is one change to the plan's text.
type EditBody struct {
	Do    string          `json:"do" enum:"set,add,remove" doc:"set a key's value, add an entry to a list, or remove a key or entry"`
	Path  []string        `json:"path" minItems:"1" maxItems:"32" nullable:"false" doc:"keys from the top of the plan; in lists an entry's name, or its index from 0"`
	Value json.RawMessage `json:"value,omitempty" doc:"what is set or added, as the plan would hold it"`
}

// A TryBody asks what would be if a version of the plan were changed.
type TryBody struct {
	Version string     `json:"version,omitempty" maxLength:"64" doc:"what is changed; the file when left out"`
	Edits   []EditBody `json:"edits" maxItems:"1000" nullable:"false"`
	Link    string     `json:"link,omitempty" maxLength:"500" doc:"compute this link alone, by its name or as A..B: the quick answer while something is dragged. Interference is looked at only where all links are computed"`
}

// A Tried version is held for other calls to ask: of sections, antennas, its text. Nothing is written
// to the file.
type Tried struct {
	Version string       `json:"version" doc:"names the changed text"`
	Links   report.Links `json:"links"`
}

func (s *Server) registerTry(api huma.API) {
	answer(api, sendOperation("tryEdits", http.MethodPost, "/api/try", "The links as they would be after changes, without saving", TryBody{
		Link: "West head..Ormvik/coast",
		Edits: []EditBody{
			{Do: plan.SetKey, Path: []string{"sites", "West head", "at"}, Value: json.RawMessage(`"47.50100 N, 20.21800 W"`)},
			{Do: plan.SetKey, Path: []string{"sites", "West head", "antenna", "above_ground"}, Value: json.RawMessage(`"6 m"`)},
		},
	}), s.tryEdits)
}

func (s *Server) tryEdits(ctx context.Context, in *struct{ Body TryBody }) (Tried, error) {
	from, err := s.shelf.take(in.Body.Version)
	if err != nil {
		return Tried{}, err
	}
	defer s.shelf.release(from)
	edits := make([]plan.Edit, len(in.Body.Edits))
	for i, e := range in.Body.Edits {
		edits[i] = plan.Edit(e)
	}
	text, err := plan.EditText(from.text, edits...)
	if err != nil {
		return Tried{}, err
	}
	v, err := s.shelf.try(text, from)
	if err != nil {
		return Tried{}, err
	}
	defer s.shelf.release(v)
	links, err := v.answer(ctx, in.Body.Link)
	return Tried{v.id, links}, err
}
