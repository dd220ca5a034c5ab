package main

import "context"

func checkVet(ctx context.Context) error { return show(ctx, "go", "vet", "./...") }

func checkStatic(ctx context.Context) error { return show(ctx, "go", "tool", "staticcheck", "./...") }
