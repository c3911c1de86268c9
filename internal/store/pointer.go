package store

import (
	"crypto/sha256"
	"encoding/binary"
	"errors"
	"fmt"
	"time"

	"github.com/go-json-experiment/json"
)

// A Pointer says which set is in use. It is one entry of the history and never changes.
type Pointer struct {
	Number   int       `json:"number"` // 1 is the first
	Digest   string    `json:"digest"`
	Canary   *Canary   `json:"canary,omitzero"`
	At       time.Time `json:"at"`                // when it was written, UTC
	Restores int       `json:"restores,omitzero"` // number of the entry that this one goes back to; 0 if it does not go back
}

// A Canary is a set on trial: it answers a share of the requests.
type Canary struct {
	Digest  string `json:"digest"`
	Percent int    `json:"percent"` // of requests, 1 to 99
}

const maxPointer = 4 << 10

// decodePointer reads an entry of the history strictly.
func decodePointer(doc []byte) (*Pointer, error) {
	var p Pointer
	if err := json.Unmarshal(doc, &p, json.RejectUnknownMembers(true)); err != nil {
		return nil, err
	}
	return &p, p.check()
}

func (p *Pointer) encode() ([]byte, error) {
	doc, err := json.Marshal(p)
	return append(doc, '\n'), err
}

func (p *Pointer) check() error {
	_, bad := setKey(p.Digest)
	switch {
	case bad != nil:
		return bad
	case p.Number < 1:
		return fmt.Errorf("%d is no number of an entry; the first is 1", p.Number)
	case p.Restores < 0 || p.Restores >= p.Number:
		return fmt.Errorf("entry %d cannot go back to entry %d", p.Number, p.Restores)
	case p.Canary == nil:
		return nil
	}
	return p.Canary.check(p.Digest)
}

func (c *Canary) check(beside string) error {
	if c.Percent < 1 || c.Percent > 99 {
		return fmt.Errorf("a canary takes 1 to 99 per cent of requests, not %d", c.Percent)
	}
	if c.Digest == beside {
		return errors.New("the canary is the set in use")
	}
	_, err := setKey(c.Digest)
	return err
}

// Choose gives the digest of the set that answers a request. The same request id has the same answer as long as the canary stays, and a
// larger share keeps the requests of a smaller one. A request without an id gets the set in use.
func (p *Pointer) Choose(requestID string) string {
	if p.Canary == nil || requestID == "" {
		return p.Digest
	}
	sum := sha256.Sum256([]byte(p.Canary.Digest + "\n" + requestID))
	if binary.BigEndian.Uint64(sum[:8])%100 < uint64(p.Canary.Percent) {
		return p.Canary.Digest
	}
	return p.Digest
}
