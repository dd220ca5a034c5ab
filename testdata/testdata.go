// Package testdata holds what is read by tests, and the demo sheets that the program offers as examples.
package testdata

import "embed"

// Demo holds demo/*.sheet.json: the examples of Harrow Lane Glasshouses, which is our own invention.
//
//go:embed demo/*.sheet.json
var Demo embed.FS
