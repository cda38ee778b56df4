package main

import (
	"errors"
	"fmt"
	"net"
	"os"
	"syscall"

	"fellreach/web"

	"github.com/spf13/cobra"
)

func newServe(t *terminal) *cobra.Command {
	var listen, page string
	cmd := &cobra.Command{
		Use:   "serve PLAN",
		Short: "Show a plan on a page in the browser, with an API",
		Long:  "Serve a plan to a browser on this machine: map, sections, budgets, antennas, and the API behind them,\ndescribed at /api/openapi.json. Nothing is asked of the internet. The first line of standard output is\nthe address; interrupt the program to end it.",
		Args:  arguments(1, 1, "one plan file"),
		RunE: func(cmd *cobra.Command, args []string) error {
			options := web.Options{Plan: args[0], Page: web.Page(), Log: t.err}
			if page != "" {
				options.Page = os.DirFS(page)
			}
			server, err := web.New(options)
			if err != nil {
				return err
			}
			defer server.Close()
			on, err := listenOn(listen)
			if err != nil {
				return err
			}
			fmt.Fprintf(t.out, "http://%s/\n", on.Addr())
			return server.Serve(cmd.Context(), on)
		},
	}
	cmd.Flags().StringVar(&listen, "listen", "127.0.0.1:8760", "address and port; port 0 picks a free one")
	cmd.Flags().StringVar(&page, "page", "", "take the page from this folder, to develop it")
	return cmd
}

// listenOn opens a port with a message that says what to do if it cannot.
func listenOn(address string) (net.Listener, error) {
	on, err := net.Listen("tcp", address)
	switch {
	case errors.Is(err, syscall.EADDRINUSE):
		return nil, fmt.Errorf("the address %s is in use\n    hint: end the program there, or take another port, as in --listen 127.0.0.1:0", address)
	case err != nil:
		return nil, fmt.Errorf("cannot listen on %q: %w\n    hint: an address and a port, as in --listen 127.0.0.1:8760", address, err)
	}
	return on, nil
}
