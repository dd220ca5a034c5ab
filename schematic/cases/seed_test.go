package cases_test

import "flag"

// Random tests begin from a fixed seed, so that they say the same on every machine; -rapid.seed sets another.
func init() {
	for name, value := range map[string]string{"rapid.seed": "20261201", "rapid.nofailfile": "true"} {
		if err := flag.Set(name, value); err != nil {
			panic(err)
		}
	}
}
