package web

import (
	"context"
	"encoding/json"
	"errors"
	"io/fs"
	"net/http"

	"fellreach/link/plan"
	"fellreach/terrain"

	"github.com/danielgtaylor/huma/v2"
)

// A Problem tells what is wrong with a request, as RFC 9457 has it.
type Problem struct {
	Title  string          `json:"title"`
	Status int             `json:"status"`
	Detail string          `json:"detail" doc:"what is wrong, for a person"`
	Errors []ProblemDetail `json:"errors,omitempty" doc:"every single thing that is wrong"`
}

// A ProblemDetail is one thing wrong: in the request, or at a line of the plan.
type ProblemDetail struct {
	Message  string `json:"message"`
	Location string `json:"location,omitempty" doc:"place in the request, such as body.edits[0].path"`
	Value    any    `json:"value,omitempty" doc:"what stands at the location"`
	Line     int    `json:"line,omitempty" doc:"line of the plan, from 1"`
	Column   int    `json:"column,omitempty" doc:"column of the plan, from 1"`
	Field    string `json:"field,omitempty" doc:"key of the plan, such as sites[2].antenna.above_ground"`
	Hint     string `json:"hint,omitempty" doc:"what to do about it"`
}

func (p *Problem) Error() string { return p.Detail }

// GetStatus and ContentType are what huma asks an error for.
func (p *Problem) GetStatus() int { return p.Status }

// ContentType gives problems their own media type.
func (p *Problem) ContentType(string) string { return "application/problem+json" }

func problem(status int, detail string) *Problem {
	return &Problem{Title: http.StatusText(status), Status: status, Detail: detail}
}

// refuse writes a problem outside huma's operations.
func refuse(w http.ResponseWriter, status int, detail string) {
	w.Header().Set("Content-Type", "application/problem+json")
	w.WriteHeader(status)
	_ = json.NewEncoder(w).Encode(problem(status, detail))
}

// asProblem gives an error from below its status: what is wrong in the plan, or in what was asked
// of it, is 422.
func asProblem(err error) error {
	var known *Problem
	var inPlan plan.Errors
	var void *terrain.VoidError
	switch {
	case err == nil:
		return nil
	case errors.As(err, &known):
		return known
	case errors.As(err, &inPlan):
		p := problem(http.StatusUnprocessableEntity, inPlan.Error())
		p.Errors = details(inPlan)
		return p
	case errors.As(err, &void):
		return problem(http.StatusUnprocessableEntity, err.Error())
	case errors.Is(err, context.DeadlineExceeded):
		return problem(http.StatusServiceUnavailable, "the answer took too long and was given up")
	case errors.Is(err, context.Canceled):
		return problem(http.StatusServiceUnavailable, "the request was given up")
	case errors.Is(err, fs.ErrNotExist), errors.Is(err, fs.ErrPermission):
		return problem(http.StatusInternalServerError, err.Error())
	}
	return problem(http.StatusUnprocessableEntity, err.Error())
}

// details lists what is wrong with a plan.
func details(errs plan.Errors) []ProblemDetail {
	list := make([]ProblemDetail, 0, len(errs))
	for _, e := range errs {
		list = append(list, ProblemDetail{Message: e.Problem, Line: e.Line, Column: e.Column, Field: e.Field, Hint: e.Hint})
	}
	return list
}

var _ huma.StatusError = (*Problem)(nil)
