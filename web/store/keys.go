package store

import (
	"context"
	"crypto/hmac"
	"crypto/rand"
	"crypto/sha256"
	"crypto/subtle"
	"database/sql"
	"encoding/base32"
	"errors"
	"fmt"
	"slices"
	"strings"
	"time"
	"unicode"
	"unicode/utf8"

	"loopwright/schematic"
)

// Role says what the holder of a key may do.
type Role string

// The roles: Edit may do everything, Review and View may look.
const (
	Edit   Role = "edit"
	Review Role = "review"
	View   Role = "view"
)

// Access is what a key opens.
type Access struct {
	Sheet    ID
	Role     Role
	KeyName  string // whom the key was made for; empty for the edit key
	Revision int    // the newest of the sheet
}

// Key is one key of a sheet as its owner sees it.
type Key struct {
	Name    string
	Role    Role
	Expires time.Time // zero: never
	Expired bool
	Key     string
}

// letters writes keys: 20 bytes are 32 characters that can be told apart on paper and need no escaping in an address.
var letters = base32.NewEncoding("0123456789abcdefghjkmnpqrstvwxyz").WithPadding(base32.NoPadding)

const keyBytes = 20

// newKey gives an unguessable key of 160 random bits.
func newKey() string {
	var random [keyBytes]byte
	rand.Read(random[:]) // never fails
	return letters.EncodeToString(random[:])
}

// derive gives the key that belongs to a role, a name and a salt, from the edit key of its sheet:
//
//	first 160 bits of HMAC-SHA256(edit key, "loopwright key" 0 role 0 name 0 salt)
//
// Whoever holds the edit key can show it again, and nobody else can find it. HMAC: RFC 2104.
func derive(editKey string, role Role, name string, salt []byte) string {
	mac := hmac.New(sha256.New, []byte(editKey))
	fmt.Fprintf(mac, "loopwright key\x00%s\x00%s\x00%s", role, name, salt)
	return letters.EncodeToString(mac.Sum(nil)[:keyBytes])
}

func hashOf(key string) []byte {
	sum := sha256.Sum256([]byte(key))
	return sum[:]
}

// Access gives what a key opens, or ErrNotFound. Keys are found by their hash, so how long that takes tells nothing
// about keys that exist.
func (s *Store) Access(ctx context.Context, key string) (Access, error) {
	var a Access
	var stored []byte
	var expires sql.NullInt64
	wanted := hashOf(key)
	err := s.reads.QueryRowContext(ctx, `SELECT hash, sheet, role, name, expires, revision
		FROM keys JOIN sheets ON sheets.id = keys.sheet WHERE hash = ? AND revoked IS NULL`, wanted).
		Scan(&stored, &a.Sheet, &a.Role, &a.KeyName, &expires, &a.Revision)
	switch {
	case errors.Is(err, sql.ErrNoRows):
		return Access{}, ErrNotFound
	case err != nil:
		return Access{}, fmt.Errorf("looking up a key: %w", err)
	case subtle.ConstantTimeCompare(stored, wanted) != 1 || s.past(expires):
		return Access{}, ErrNotFound
	}
	return a, nil
}

// past reports whether the time has come, in milliseconds; null never comes.
func (s *Store) past(milliseconds sql.NullInt64) bool {
	return milliseconds.Valid && milliseconds.Int64 <= s.Now().UnixMilli()
}

// editor gives the sheet that an edit key opens.
func (s *Store) editor(ctx context.Context, editKey string) (ID, error) {
	access, err := s.Access(ctx, editKey)
	if err == nil && access.Role != Edit {
		err = ErrNotAllowed
	}
	return access.Sheet, err
}

// Share makes a key of a role below Edit for somebody, and gives it. The name must not be in use by a key that has not
// been withdrawn (ErrNameTaken); a zero time never expires. What makes no sense is a *schematic.PlaceError.
func (s *Store) Share(ctx context.Context, editKey string, role Role, name string, expires time.Time) (string, error) {
	sheet, err := s.editor(ctx, editKey)
	if err != nil {
		return "", err
	}
	if err := s.checkShare(role, name, expires); err != nil {
		return "", err
	}
	salt := make([]byte, 16)
	rand.Read(salt) // never fails
	key := derive(editKey, role, name, salt)
	until := sql.NullInt64{Int64: expires.UnixMilli(), Valid: !expires.IsZero()}
	err = s.do(ctx, func(g *group) error {
		var taken bool
		err := g.queryRow("SELECT EXISTS (SELECT 1 FROM keys WHERE sheet = ? AND name = ? AND revoked IS NULL)",
			[]any{sheet, name}, &taken)
		if err != nil {
			return err
		}
		if taken {
			return refused{ErrNameTaken}
		}
		return s.insertKey(g, key, sheet, role, name, salt, until)
	})
	if err != nil {
		return "", err
	}
	return key, nil
}

func (s *Store) insertKey(g *group, key string, sheet ID, role Role, name string, salt []byte, expires sql.NullInt64) error {
	_, err := g.exec("INSERT INTO keys (hash, sheet, role, name, salt, created, expires) VALUES (?, ?, ?, ?, ?, ?, ?)",
		hashOf(key), sheet, role, name, salt, s.Now().UnixMilli(), expires)
	return err
}

// longestName is how many characters the name of a key has at most.
const longestName = 60

func (s *Store) checkShare(role Role, name string, expires time.Time) error {
	refuse := func(place, message string) error { return &schematic.PlaceError{Place: place, Message: message} }
	switch {
	case !slices.Contains([]Role{Review, View}, role):
		return refuse("role", `a key is made for "review" or for "view"`)
	case strings.TrimSpace(name) == "":
		return refuse("name", "a key needs the name of whom it is for")
	case name != strings.TrimSpace(name) || name == "." || name == ".." ||
		strings.ContainsFunc(name, func(r rune) bool { return !unicode.IsPrint(r) }):
		return refuse("name", "the name of a key is one line of plain text, without spaces around it")
	case utf8.RuneCountInString(name) > longestName:
		return refuse("name", fmt.Sprintf("the name of a key has at most %d characters", longestName))
	case !expires.IsZero() && !expires.After(s.Now()):
		return refuse("expires", "a key expires at a time to come")
	}
	return nil
}

// Keys lists the keys that have been made from an edit key and have not been withdrawn, in order of their names.
func (s *Store) Keys(ctx context.Context, editKey string) ([]Key, error) {
	sheet, err := s.editor(ctx, editKey)
	if err != nil {
		return nil, err
	}
	rows, err := s.reads.QueryContext(ctx, `SELECT name, role, salt, expires FROM keys
		WHERE sheet = ? AND name <> '' AND revoked IS NULL ORDER BY name`, sheet)
	if err != nil {
		return nil, fmt.Errorf("listing keys: %w", err)
	}
	defer rows.Close()
	var keys []Key
	for rows.Next() {
		var key Key
		var salt []byte
		var expires sql.NullInt64
		if err := rows.Scan(&key.Name, &key.Role, &salt, &expires); err != nil {
			return nil, fmt.Errorf("listing keys: %w", err)
		}
		if expires.Valid {
			key.Expires = time.UnixMilli(expires.Int64).UTC()
		}
		key.Expired = s.past(expires)
		key.Key = derive(editKey, key.Role, key.Name, salt)
		keys = append(keys, key)
	}
	return keys, rows.Err()
}

// Revoke withdraws the key of a name for good. The name is free again; a new key of that name is another key.
func (s *Store) Revoke(ctx context.Context, editKey, name string) error {
	sheet, err := s.editor(ctx, editKey)
	if err != nil {
		return err
	}
	if name == "" {
		return ErrNotFound
	}
	return s.do(ctx, func(g *group) error {
		result, err := g.exec("UPDATE keys SET revoked = ? WHERE sheet = ? AND name = ? AND revoked IS NULL",
			s.Now().UnixMilli(), sheet, name)
		if err != nil {
			return err
		}
		if count, err := result.RowsAffected(); err != nil {
			return err
		} else if count == 0 {
			return refused{ErrNotFound}
		}
		return nil
	})
}
