package web

import (
	"fmt"
	"net"
	"net/http"
	"strings"
)

// contentPolicy lets the page run its own scripts and styles and ask its own server, nothing else.
// The data: pictures are the icons in the map library's style sheet.
const contentPolicy = "default-src 'none'; script-src 'self'; worker-src 'self'; style-src 'self'; font-src 'self'; " +
	"img-src 'self' data:; connect-src 'self'; base-uri 'none'; form-action 'none'; frame-ancestors 'none'"

// secured sends the headers that keep other pages, and what a page might load, out.
func secured(next http.Handler) http.Handler {
	return http.HandlerFunc(func(w http.ResponseWriter, r *http.Request) {
		h := w.Header()
		h.Set("Cache-Control", "no-cache")
		h.Set("Content-Security-Policy", contentPolicy)
		h.Set("X-Content-Type-Options", "nosniff")
		h.Set("Referrer-Policy", "no-referrer")
		h.Set("Cross-Origin-Opener-Policy", "same-origin")
		h.Set("Cross-Origin-Resource-Policy", "same-origin")
		next.ServeHTTP(w, r)
	})
}

// ownHost refuses requests for another host's name with 421: a foreign name that has been pointed
// at this machine. Names of this machine are localhost and its addresses.
func ownHost(next http.Handler) http.Handler {
	return http.HandlerFunc(func(w http.ResponseWriter, r *http.Request) {
		if !isOwnHost(r.Host) {
			refuse(w, http.StatusMisdirectedRequest, fmt.Sprintf("this server does not answer for the host %.100q: ask it by its address or as localhost", r.Host))
			return
		}
		next.ServeHTTP(w, r)
	})
}

func isOwnHost(host string) bool {
	if name, _, err := net.SplitHostPort(host); err == nil {
		host = name
	}
	host = strings.TrimSuffix(strings.TrimPrefix(host, "["), "]")
	return strings.EqualFold(host, "localhost") || net.ParseIP(host) != nil
}

// ownOrigin refuses writing calls that come from the pages of another origin with 403.
func ownOrigin(next http.Handler) http.Handler {
	guard := http.NewCrossOriginProtection()
	guard.SetDenyHandler(http.HandlerFunc(func(w http.ResponseWriter, _ *http.Request) {
		refuse(w, http.StatusForbidden, "pages of another origin may not change anything here")
	}))
	return guard.Handler(next)
}

// asJSON takes every body for JSON whatever it is called, as command-line clients send it.
func asJSON(next http.Handler) http.Handler {
	return http.HandlerFunc(func(w http.ResponseWriter, r *http.Request) {
		if r.Body != http.NoBody {
			r.Header.Set("Content-Type", "application/json")
		}
		next.ServeHTTP(w, r)
	})
}
