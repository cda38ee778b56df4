package web

import (
	"context"
	"errors"
	"net/http"
	"path/filepath"

	"fellreach/link/plan"

	"github.com/danielgtaylor/huma/v2"
)

// A PlanAnswer is a version of the plan: its text, and what it holds.
type PlanAnswer struct {
	Version string `json:"version" doc:"names the text"`
	File    string `json:"file" doc:"name of the plan's file"`
	InFile  bool   `json:"in_file" doc:"whether the file holds this version now"`
	// FileProblems is there where the file cannot be used as it is now.
	FileProblems []ProblemDetail `json:"file_problems" doc:"what is wrong with the file as it is now; the version is then the last good one"`
	Text         string          `json:"text"`
	PlanSummary
}

// A TextBody is a text of the plan.
type TextBody struct {
	Text string `json:"text" maxLength:"1048576"`
}

// A Checked text is good if it has no problems.
type Checked struct {
	Version  string          `json:"version" doc:"names the text"`
	Problems []ProblemDetail `json:"problems"`
}

// A SaveBody is a text to put into the plan's file.
type SaveBody struct {
	Read string `json:"read" doc:"the version that the file held when it was read" maxLength:"64"`
	Text string `json:"text" maxLength:"1048576"`
}

// Saved tells the file's new version.
type Saved struct {
	Version string `json:"version"`
}

// examplePlan is a whole plan for the description of the API.
const examplePlan = `format: 1
title: two gauges
ground: {elevation: {files: [hallin-dem.tif]}, beyond: sea}
channels: {poll: {frequency: "151.5 MHz", bandwidth: "12.5 kHz"}}
radios: {logger: {power: "5 W", sensitivity: "-117 dBm"}}
antennas: {stick: {kind: omni, gain: "5 dBi", impedance: "50 ohm"}}
sites:
  - {name: Mouth Hill, at: UTM 27N 591695 5261215, radio: logger, antenna: {use: stick, above_ground: "8 m"}}
  - {name: Gauge 3, at: UTM 27N 583745 5257525, radio: logger, antenna: {use: stick, above_ground: "4 m"}}
links:
  - {from: Gauge 3, to: Mouth Hill}
`

func (s *Server) registerPlan(api huma.API) {
	answer(api, readOperation("readPlan", "/api/plan", "The plan: its text and what it holds"), s.readPlan)
	answer(api, sendOperation("checkPlan", http.MethodPost, "/api/plan/check", "What is wrong with a text of the plan", TextBody{examplePlan}), s.checkPlan)
	answer(api, sendOperation("savePlan", http.MethodPut, "/api/plan", "Save a text to the plan's file, if nobody has changed it meanwhile", SaveBody{"b175ef3bb67932f7", examplePlan}), s.savePlan)
}

func (s *Server) readPlan(_ context.Context, in *struct{ Versioned }) (PlanAnswer, error) {
	file, broken := s.shelf.lastGood()
	defer s.shelf.release(file)
	v := file
	if in.Version != "" {
		var err error
		if v, err = s.shelf.take(in.Version); err != nil {
			return PlanAnswer{}, err
		}
		defer s.shelf.release(v)
	}
	return PlanAnswer{
		Version: v.id, File: filepath.Base(s.shelf.path), InFile: v == file && broken == nil, FileProblems: problemsOf(broken),
		Text: string(v.text), PlanSummary: summaryOf(v.network),
	}, nil
}

// problemsOf lists what an error says of a plan.
func problemsOf(err error) []ProblemDetail {
	var inPlan plan.Errors
	switch {
	case err == nil:
		return []ProblemDetail{}
	case errors.As(err, &inPlan):
		return details(inPlan)
	}
	return []ProblemDetail{{Message: err.Error()}}
}

func (s *Server) checkPlan(_ context.Context, in *struct{ Body TextBody }) (Checked, error) {
	text := []byte(in.Body.Text)
	file, _ := s.shelf.lastGood()
	defer s.shelf.release(file)
	v, err := s.shelf.try(text, file)
	if err == nil {
		s.shelf.release(v)
	}
	return Checked{idOf(text), problemsOf(err)}, nil
}

func (s *Server) savePlan(_ context.Context, in *struct{ Body SaveBody }) (Saved, error) {
	text := []byte(in.Body.Text)
	file, _ := s.shelf.lastGood()
	defer s.shelf.release(file)
	v, err := s.shelf.try(text, file)
	if err != nil {
		return Saved{}, err
	}
	defer s.shelf.release(v)
	return Saved{v.id}, s.shelf.save(text, in.Body.Read)
}
