package main

import (
	"context"
	"errors"
	"fmt"
	"log/slog"
	"net"

	"loopwright/web"
	"loopwright/web/store"
)

type serveCommand struct {
	Listen   string `help:"Address to listen at." default:"127.0.0.1:8080" placeholder:"ADDRESS"`
	Database string `help:"File that keeps the sheets; made when there is none." default:"loopwright.db" placeholder:"FILE"`
	Metrics  string `help:"Address to serve metrics at; not served without it." placeholder:"ADDRESS"`
}

// Run serves until the context ends.
func (c *serveCommand) Run(ctx context.Context, s streams) (err error) {
	log := slog.New(slog.NewTextHandler(s.err, nil))
	// The addresses come first, so that no database is made when there is nobody to serve it.
	listener, err := listen(c.Listen, "--listen")
	if err != nil {
		return err
	}
	defer listener.Close()
	var forMetrics net.Listener
	if c.Metrics != "" {
		if forMetrics, err = listen(c.Metrics, "--metrics"); err != nil {
			return err
		}
		defer forMetrics.Close()
	}
	sheets, err := store.Open(ctx, c.Database)
	if err != nil {
		return fmt.Errorf("%w (--database)", err)
	}
	defer func() { err = errors.Join(err, sheets.Close()) }()
	server, err := web.New(web.Config{Store: sheets, Log: log})
	if err != nil {
		return err
	}
	log.Info("serving", slog.String("address", listener.Addr().String()), slog.String("database", c.Database))
	if !isLocal(listener.Addr()) {
		log.Warn("other machines can reach this address, and what is sent to it is not encrypted; put a server with TLS in front of it")
	}
	fmt.Fprintf(s.err, "Loopwright is at http://%s\n", shown(listener.Addr()))
	return server.Serve(ctx, listener, forMetrics)
}

// listen takes an address that a flag gives.
func listen(address, flag string) (net.Listener, error) {
	listener, err := net.Listen("tcp", address)
	if err != nil {
		if inner := (*net.OpError)(nil); errors.As(err, &inner) {
			err = inner.Err
		}
		return nil, fmt.Errorf("cannot listen at %s: %w; choose another address with %s", address, err, flag)
	}
	return listener, nil
}

// isLocal reports whether only this machine can reach an address.
func isLocal(address net.Addr) bool {
	tcp, ok := address.(*net.TCPAddr)
	return ok && tcp.IP.IsLoopback()
}

// shown is how a browser on this machine reaches an address.
func shown(address net.Addr) string {
	if tcp, ok := address.(*net.TCPAddr); ok && tcp.IP.IsUnspecified() {
		return fmt.Sprintf("localhost:%d", tcp.Port)
	}
	return address.String()
}
