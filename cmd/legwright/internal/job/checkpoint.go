package job

import (
	"crypto/sha256"
	"encoding/hex"
	"encoding/json"
	"fmt"

	"legwright/cmd/legwright/internal/study"
)

// Checkpoint tells what an unfinished study was working on. The search has no state to go on
// from: the same brief, seed and budget lead it to the same designs again.
type Checkpoint struct {
	Program     string `json:"program"`
	Brief       string `json:"brief"` // SHA-256 of the brief and its pose files
	Seed        int64  `json:"seed"`
	Budget      int    `json:"budget"`
	Evaluations int    `json:"evaluations"` // spent when it was stopped
}

// NewCheckpoint is the checkpoint of a run that has not begun.
func NewCheckpoint(s *study.Sources, r Run) *Checkpoint {
	return &Checkpoint{Program: Program(), Brief: sourcesHash(s), Seed: r.Seed, Budget: r.Evaluations}
}

// sourcesHash is the SHA-256 of the brief and its pose files, in hex.
func sourcesHash(s *study.Sources) string {
	h := sha256.New()
	h.Write(s.Brief.Bytes)
	for _, p := range s.Poses {
		h.Write(p.Bytes)
	}
	return hex.EncodeToString(h.Sum(nil))
}

// ReadCheckpoint reads what Bytes wrote; nil for no bytes.
func ReadCheckpoint(b []byte) (*Checkpoint, error) {
	if b == nil {
		return nil, nil
	}
	c := new(Checkpoint)
	if err := json.Unmarshal(b, c); err != nil {
		return nil, fmt.Errorf("the checkpoint cannot be read (%w); begin anew with --force", err)
	}
	return c, nil
}

// Bytes is the checkpoint as the folder holds it.
func (c *Checkpoint) Bytes() ([]byte, error) { return study.Encode(c) }

// Continues says why a run does not go on with the study that old was written for, or gives nil.
func (c *Checkpoint) Continues(old *Checkpoint) error {
	switch {
	case old.Brief != c.Brief:
		return fmt.Errorf("the unfinished study there is of another brief; give that brief, or --force to begin anew")
	case old.Seed != c.Seed:
		return fmt.Errorf("the unfinished study there has seed %d, this run %d; give the same seed, or --force to begin anew", old.Seed, c.Seed)
	case old.Budget != c.Budget:
		return fmt.Errorf("the unfinished study there was to run %d evaluations, this run %d; give the same number, or --force to begin anew", old.Budget, c.Budget)
	}
	return nil
}
