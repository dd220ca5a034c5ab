// Package browser tests the page as people use it: the built program, a real Chromium, a mouse, a keyboard and a finger.
// It holds tests only.
package browser
