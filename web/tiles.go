package web

import "net/http"

func (s *Server) serveTile(w http.ResponseWriter, r *http.Request) {}
