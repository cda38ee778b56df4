package web

import (
	"context"
	"errors"
	"fmt"
	"io"
	"io/fs"
	"log"
	"net"
	"net/http"
	"strings"
	"time"

	"github.com/danielgtaylor/huma/v2"
	"github.com/go-chi/chi/v5"
	"github.com/go-chi/chi/v5/middleware"
)

// Limits of the server. Event streams end with their job and know no time limit of their own.
const (
	maxPlanBytes   = 1 << 20 // of a plan's text, as the plan package takes it
	maxBodyBytes   = 2*maxPlanBytes + 64<<10
	maxHeaderBytes = 64 << 10
	readTimeout    = 30 * time.Second
	answerTimeout  = 2 * time.Minute
	idleTimeout    = 2 * time.Minute
	stopTimeout    = 5 * time.Second // for requests at work when the server is told to stop

	maxAtOnce  = 8 // requests that are worked on
	maxWaiting = 512
	waitTime   = 30 * time.Second
)

// Options say what a [Server] serves.
type Options struct {
	Plan string    // path of the plan's file
	Page fs.FS     // the page; see [Page]
	Log  io.Writer // where what goes wrong inside is told
}

// A Server answers for one plan file. It is an [http.Handler]; Close ends it.
type Server struct {
	page  fs.FS
	log   *log.Logger
	shelf *shelf
	tiles *tileStore
	jobs  coverJobs
	api   *huma.OpenAPI
	http.Handler
}

// New opens the plan and makes the server. A plan that is wrong is the error that the commands give.
func New(o Options) (*Server, error) {
	shelf, err := openShelf(o.Plan)
	if err != nil {
		return nil, err
	}
	s := &Server{page: o.Page, log: log.New(o.Log, "fellreach: ", 0), shelf: shelf, tiles: newTileStore(tileStoreBytes)}
	if s.Handler, err = s.routes(); err != nil {
		s.Close()
		return nil, err
	}
	return s, nil
}

// Close ends all jobs and closes the rasters. No request may be at work any more.
func (s *Server) Close() {
	s.jobs.close()
	s.shelf.close()
}

func (s *Server) routes() (http.Handler, error) {
	r := chi.NewMux()
	r.Use(secured, ownHost, ownOrigin, s.recovered, middleware.GetHead)
	r.NotFound(s.servePage)
	r.MethodNotAllowed(func(w http.ResponseWriter, _ *http.Request) {
		refuse(w, http.StatusMethodNotAllowed, "this address does not know that method")
	})
	r.Get("/", s.servePage)
	var err error
	r.Group(func(r chi.Router) {
		r.Use(bounded(), asJSON)
		r.Get("/tiles/{kind}/{source}/{z}/{x}/{y}.png", s.serveTile)
		err = s.serveAPI(r)
	})
	return r, err
}

// bounded lets so many requests work at once, on all addresses together, each for so long. A stream of
// events only waits.
func bounded() func(http.Handler) http.Handler {
	throttle := middleware.ThrottleBacklog(maxAtOnce, maxWaiting, waitTime)
	return func(next http.Handler) http.Handler {
		inTime := throttle(middleware.Timeout(answerTimeout)(next))
		return http.HandlerFunc(func(w http.ResponseWriter, r *http.Request) {
			if strings.HasSuffix(r.URL.Path, "/events") {
				next.ServeHTTP(w, r)
				return
			}
			inTime.ServeHTTP(w, r)
		})
	}
}

// recovered turns a panic into an answer and a line of the log, so that the server goes on.
func (s *Server) recovered(next http.Handler) http.Handler {
	return http.HandlerFunc(func(w http.ResponseWriter, r *http.Request) {
		defer func() {
			switch p := recover(); p {
			case nil:
			case http.ErrAbortHandler:
				panic(p)
			default:
				s.log.Printf("error: %s %s: %v", r.Method, r.URL.Path, p)
				refuse(w, http.StatusInternalServerError, "something went wrong inside; the server's standard error says what")
			}
		}()
		next.ServeHTTP(w, r)
	})
}

// Serve answers on a listener until the context ends; then it lets requests at work finish for some
// seconds. It closes the listener.
func (s *Server) Serve(ctx context.Context, on net.Listener) error {
	server := &http.Server{
		Handler: s, ErrorLog: s.log, ReadHeaderTimeout: readTimeout, IdleTimeout: idleTimeout, MaxHeaderBytes: maxHeaderBytes,
		BaseContext: func(net.Listener) context.Context { return ctx },
	}
	stopped := make(chan error, 1)
	stop := context.AfterFunc(ctx, func() {
		late, cancel := context.WithTimeout(context.WithoutCancel(ctx), stopTimeout)
		defer cancel()
		err := server.Shutdown(late)
		if err != nil {
			err = errors.Join(fmt.Errorf("some requests did not end in time: %w", err), server.Close())
		}
		stopped <- err
	})
	err := server.Serve(on)
	if stop() { // it ended by itself
		return err
	}
	return <-stopped
}
