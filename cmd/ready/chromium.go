package main

import (
	"context"
	"errors"
	"fmt"
	"os"
	"os/exec"
)

// bringChromium sees to it that there is a Chromium: where none is found, it installs Debian's, if it may.
func bringChromium(ctx context.Context) error {
	for _, name := range []string{"chromium", "chromium-browser", "google-chrome"} {
		if _, err := exec.LookPath(name); err == nil {
			return nil
		}
	}
	apt, err := exec.LookPath("apt-get")
	if err != nil || os.Geteuid() != 0 {
		return errors.New("the browser tests need Chromium: install the package chromium, or run this as root on Debian")
	}
	fmt.Println("no Chromium was found: installing Debian's package chromium")
	for _, arguments := range [][]string{{"-q", "update"}, {"-q", "-y", "--no-install-recommends", "install", "chromium"}} {
		command := exec.CommandContext(ctx, apt, arguments...)
		command.Env = append(os.Environ(), "DEBIAN_FRONTEND=noninteractive")
		if out, err := command.CombinedOutput(); err != nil {
			return fmt.Errorf("apt-get %s: %w\n%s", arguments[len(arguments)-1], err, tail(out))
		}
	}
	return nil
}

// tail is the last part of a long output.
func tail(out []byte) []byte { return out[max(0, len(out)-2000):] }
