package main

import (
	"context"
	"errors"
	"fmt"
	"log/slog"
	"net"
	"strings"

	"loopwright/web"
	"loopwright/web/store"
)

type serveCommand struct {
	Listen   string `help:"Address to listen at." default:"127.0.0.1:8080"`
	Database string `help:"File that keeps the sheets." default:"loopwright.db" placeholder:"FILE"`
	Metrics  string `help:"Address to serve metrics at; not served without it." placeholder:"ADDRESS"`
}

// Run serves until the context ends.
func (c *serveCommand) Run(ctx context.Context, s streams) error {
	log := slog.New(slog.NewTextHandler(s.err, nil))
	if strings.HasPrefix(c.Database, "postgres:") || strings.HasPrefix(c.Database, "postgresql:") {
		return errors.New("a PostgreSQL database cannot be used yet; name a file with --database")
	}
	kept, err := store.Open(ctx, c.Database)
	if err != nil {
		return fmt.Errorf("the database %s cannot be opened: %w", c.Database, err)
	}
	defer func() {
		if err := kept.Close(); err != nil {
			log.Error("closing the database", slog.Any("error", err))
		}
	}()
	listener, err := net.Listen("tcp", c.Listen)
	if err != nil {
		return fmt.Errorf("cannot listen at %s: %w; choose another address with --listen", c.Listen, err)
	}
	var forMetrics net.Listener
	if c.Metrics != "" {
		if forMetrics, err = net.Listen("tcp", c.Metrics); err != nil {
			return errors.Join(fmt.Errorf("cannot listen at %s: %w; choose another address with --metrics", c.Metrics, err), listener.Close())
		}
	}
	server, err := web.New(web.Config{Store: kept, Log: log})
	if err != nil {
		return err
	}
	fmt.Fprintf(s.err, "Loopwright is at http://%s\n", listener.Addr())
	return server.Serve(ctx, listener, forMetrics)
}
