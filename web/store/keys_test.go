package store

import (
	"bytes"
	"context"
	"crypto/hmac"
	"crypto/sha256"
	"encoding/hex"
	"errors"
	"os"
	"path/filepath"
	"regexp"
	"testing"
	"time"

	"loopwright/schematic"
)

var noon = time.Date(2027, 3, 31, 12, 0, 0, 0, time.UTC)

// opens reports what a key opens: its role, or "nothing".
func opens(t *testing.T, s *Store, key string) string {
	t.Helper()
	access, err := s.Access(context.Background(), key)
	if errors.Is(err, ErrNotFound) {
		return "nothing"
	}
	if err != nil {
		t.Fatal(err)
	}
	return string(access.Role)
}

func share(t *testing.T, s *Store, editKey string, role Role, name string, expires time.Time) string {
	t.Helper()
	key, err := s.Share(context.Background(), editKey, role, name, expires)
	if err != nil {
		t.Fatal(err)
	}
	return key
}

func TestKeysOpenTheirSheetInTheirRole(t *testing.T) {
	s, id, editKey := fresh(t)
	review := share(t, s, editKey, Review, "Colleague", time.Time{})
	view := share(t, s, editKey, View, "Bench 3", time.Time{})
	for key, role := range map[string]string{
		editKey: "edit", review: "review", view: "view", "": "nothing", editKey[1:]: "nothing", editKey + "0": "nothing",
		"00000000000000000000000000000000": "nothing",
	} {
		if got := opens(t, s, key); got != role {
			t.Errorf("%s opens %s, want %s", key, got, role)
		}
		if role != "nothing" && !regexp.MustCompile(`^[0-9a-hj-km-np-tv-z]{32}$`).MatchString(key) {
			t.Errorf("the key %q is not of 32 letters that can be told apart", key)
		}
	}
	access, err := s.Access(context.Background(), view)
	if want := (Access{Sheet: id, Role: View, KeyName: "Bench 3", Revision: 1}); err != nil || access != want {
		t.Errorf("the key opens %+v, %v; want %+v", access, err, want)
	}
}

func TestTheOwnerSeesTheKeysAgainUntilTheyAreWithdrawn(t *testing.T) {
	s, _, editKey := fresh(t)
	s.Now = func() time.Time { return noon }
	view := share(t, s, editKey, View, "Bench 3", time.Time{})
	review := share(t, s, editKey, Review, "Colleague", noon.Add(time.Hour))
	keys, err := s.Keys(context.Background(), editKey)
	if err != nil {
		t.Fatal(err)
	}
	want := []Key{{Name: "Bench 3", Role: View, Key: view}, {Name: "Colleague", Role: Review, Key: review, Expires: noon.Add(time.Hour)}}
	if len(keys) != 2 || keys[0] != want[0] || keys[1] != want[1] {
		t.Errorf("the keys are %+v, want %+v", keys, want)
	}
	if err := s.Revoke(context.Background(), editKey, "Bench 3"); err != nil {
		t.Fatal(err)
	}
	if got := opens(t, s, view); got != "nothing" {
		t.Errorf("a key that is withdrawn opens %s", got)
	}
	if err := s.Revoke(context.Background(), editKey, "Bench 3"); !errors.Is(err, ErrNotFound) {
		t.Errorf("withdrawing it again gives error %v, want not found", err)
	}
	second := share(t, s, editKey, View, "Bench 3", time.Time{})
	if second == view || opens(t, s, second) != "view" || opens(t, s, view) != "nothing" {
		t.Error("a new key of the old name is the old key")
	}
}

func TestAKeyThatHasExpiredOpensNothing(t *testing.T) {
	s, _, editKey := fresh(t)
	now := noon
	s.Now = func() time.Time { return now }
	key := share(t, s, editKey, View, "Bench 3", noon.Add(time.Hour))
	for _, moment := range []struct {
		at    time.Duration
		opens string
	}{{0, "view"}, {time.Hour - time.Millisecond, "view"}, {time.Hour, "nothing"}, {100 * time.Hour, "nothing"}} {
		now = noon.Add(moment.at)
		if got := opens(t, s, key); got != moment.opens {
			t.Errorf("after %v the key opens %s, want %s", moment.at, got, moment.opens)
		}
	}
	keys, err := s.Keys(context.Background(), editKey)
	if err != nil || len(keys) != 1 || !keys[0].Expired {
		t.Errorf("the keys are %+v, %v; want one that has expired", keys, err)
	}
}

func TestKeysThatMakeNoSenseAreRefused(t *testing.T) {
	s, _, editKey := fresh(t)
	s.Now = func() time.Time { return noon }
	view := share(t, s, editKey, View, "Bench 3", time.Time{})
	long := string(bytes.Repeat([]byte("ä"), 61))
	for _, c := range []struct {
		name    string
		key     string
		role    Role
		holder  string
		expires time.Time
		place   string
		kind    error
	}{
		{"name in use", editKey, Review, "Bench 3", time.Time{}, "", ErrNameTaken},
		{"by a view key", view, View, "Bench 4", time.Time{}, "", ErrNotAllowed},
		{"by no key", "none", View, "Bench 4", time.Time{}, "", ErrNotFound},
		{"a second edit key", editKey, Edit, "Bench 4", time.Time{}, "role", nil},
		{"unknown role", editKey, "owner", "Bench 4", time.Time{}, "role", nil},
		{"no name", editKey, View, "", time.Time{}, "name", nil},
		{"name of spaces", editKey, View, "  ", time.Time{}, "name", nil},
		{"name with a space before it", editKey, View, " Bench", time.Time{}, "name", nil},
		{"name of two lines", editKey, View, "Bench\n4", time.Time{}, "name", nil},
		{"name that an address loses", editKey, View, "..", time.Time{}, "name", nil},
		{"name of 61 characters", editKey, View, long, time.Time{}, "name", nil},
		{"expires in the past", editKey, View, "Bench 4", noon, "expires", nil},
	} {
		t.Run(c.name, func(t *testing.T) {
			_, err := s.Share(context.Background(), c.key, c.role, c.holder, c.expires)
			var place *schematic.PlaceError
			if c.kind != nil && !errors.Is(err, c.kind) || c.kind == nil && (!errors.As(err, &place) || place.Place != c.place) {
				t.Errorf("error is %v", err)
			}
		})
	}
	share(t, s, editKey, View, long[:120], time.Time{})
	if _, err := s.Keys(context.Background(), view); !errors.Is(err, ErrNotAllowed) {
		t.Errorf("a view key lists keys: %v", err)
	}
	if err := s.Revoke(context.Background(), view, "Bench 3"); !errors.Is(err, ErrNotAllowed) {
		t.Errorf("a view key withdraws keys: %v", err)
	}
	if err := s.Revoke(context.Background(), editKey, ""); !errors.Is(err, ErrNotFound) || opens(t, s, editKey) != "edit" {
		t.Errorf("the edit key has no name to withdraw it by: %v", err)
	}
}

// RFC 4231, test case 2: HMAC-SHA-256 of "what do ya want for nothing?" under the key "Jefe" (from memory). It fixes
// the method that keys are derived by; how the message is put together is ours.
func TestKeysAreDerivedByHMACOfSHA256(t *testing.T) {
	mac := hmac.New(sha256.New, []byte("Jefe"))
	mac.Write([]byte("what do ya want for nothing?"))
	if got := hex.EncodeToString(mac.Sum(nil)); got != "5bdcc146bf60754e6a042426089575c75a003f089d2739839dec58b964ec3843" {
		t.Fatalf("HMAC gives %s", got)
	}
	mac = hmac.New(sha256.New, []byte("edit"))
	mac.Write([]byte("loopwright key\x00view\x00Bench 3\x00salt"))
	if want := letters.EncodeToString(mac.Sum(nil)[:20]); derive("edit", View, "Bench 3", []byte("salt")) != want {
		t.Errorf("the derived key is %s, want %s", derive("edit", View, "Bench 3", []byte("salt")), want)
	}
	all := map[string]bool{}
	for _, key := range []string{
		derive("edit", View, "Bench 3", []byte("salt")), derive("edit", Review, "Bench 3", []byte("salt")),
		derive("edit", View, "Bench 4", []byte("salt")), derive("edit", View, "Bench 3", []byte("salz")),
		derive("edis", View, "Bench 3", []byte("salt")),
	} {
		all[key] = true
	}
	if len(all) != 5 {
		t.Errorf("role, name, salt and edit key give %d different keys, want 5", len(all))
	}
}

func TestNoKeyIsInTheDatabase(t *testing.T) {
	directory := t.TempDir()
	s, err := Open(context.Background(), filepath.Join(directory, "keys.db"))
	if err != nil {
		t.Fatal(err)
	}
	_, editKey, _, err := s.Create(context.Background(), schematic.New("Pump"))
	if err != nil {
		t.Fatal(err)
	}
	view := share(t, s, editKey, View, "Bench 3", time.Time{})
	var files int
	look := func() {
		entries, err := os.ReadDir(directory)
		if err != nil {
			t.Fatal(err)
		}
		for _, entry := range entries {
			content, err := os.ReadFile(filepath.Join(directory, entry.Name()))
			if err != nil {
				t.Fatal(err)
			}
			files++
			if bytes.Contains(content, []byte(editKey)) || bytes.Contains(content, []byte(view)) {
				t.Errorf("a key is in the file %s", entry.Name())
			}
		}
	}
	look()
	if err := s.Close(); err != nil {
		t.Fatal(err)
	}
	look()
	if files < 3 {
		t.Errorf("only %d files were looked at", files)
	}
}
