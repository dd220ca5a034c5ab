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
	if hasChromium() {
		return nil
	}
	if _, err := exec.LookPath("apt-get"); err != nil || os.Geteuid() != 0 {
		return errors.New("no Chromium was found: install the package chromium, or run this as root on Debian")
	}
	fmt.Println("no Chromium was found: installing Debian's package chromium")
	for _, arguments := range [][]string{{"-q", "update"}, {"-q", "-y", "--no-install-recommends", "install", "chromium"}} {
		c := command(ctx, "apt-get", arguments...)
		c.Env = append(os.Environ(), "DEBIAN_FRONTEND=noninteractive")
		if out, err := c.CombinedOutput(); err != nil {
			os.Stdout.Write(out)
			return fmt.Errorf("apt-get could not install the package chromium (%w): install it by hand", err)
		}
	}
	if !hasChromium() {
		return errors.New("the package chromium was installed, and still there is no chromium in PATH")
	}
	return nil
}

func hasChromium() bool {
	for _, name := range []string{"chromium", "chromium-browser", "google-chrome"} {
		if _, err := exec.LookPath(name); err == nil {
			return true
		}
	}
	return false
}
