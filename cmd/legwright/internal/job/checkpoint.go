package job

import (
	"crypto/sha256"
	"encoding/hex"
	"encoding/json"
	"fmt"

	"legwright/cmd/legwright/internal/study"
)

// Checkpoint tells what an unfinished study was working on; the log beside it holds what was
// evaluated (Journal).
type Checkpoint struct {
	Program     string `json:"program"`
	Brief       string `json:"brief"` // SHA-256 of the brief and its pose files
	Seed        int64  `json:"seed"`
	Budget      int    `json:"budget"`
	Part        string `json:"part,omitempty"`
	Prove       int    `json:"prove,omitempty"` // designs that are proved on the way
	Evaluations int    `json:"evaluations"`     // spent when it was interrupted
}

// Merging is the part of a checkpoint that stands for a merge under way.
const Merging = "merge"

// NewCheckpoint is the checkpoint of a run that has not begun.
func NewCheckpoint(s *study.Sources, r Run) *Checkpoint {
	return &Checkpoint{Program: Program(), Brief: SourcesHash(s), Seed: r.Seed, Budget: r.Evaluations, Part: r.Part.String(), Prove: r.Prove}
}

// Key tells apart the runs that a log may belong to.
func (c *Checkpoint) Key() [32]byte {
	return sha256.Sum256(fmt.Appendf(nil, "%s\n%s\n%d\n%d\n%s\n%d", c.Program, c.Brief, c.Seed, c.Budget, c.Part, c.Prove))
}

// SourcesHash is the SHA-256 of the brief and its pose files, in hex, as checkpoints, sheets and certificates name it.
func SourcesHash(s *study.Sources) string {
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
		return nil, fmt.Errorf("the checkpoint cannot be read (%.200s); begin anew with --force", study.Clean(err.Error()))
	}
	return c, nil
}

// Bytes is the checkpoint as the folder holds it.
func (c *Checkpoint) Bytes() ([]byte, error) { return study.Encode(c) }

// Continues says why a run does not go on with the study that old was written for, or gives nil.
func (c *Checkpoint) Continues(old *Checkpoint) error {
	part := func(c *Checkpoint) string {
		if c.Part == "" {
			return "a whole study"
		}
		return "part " + study.Clean(c.Part)
	}
	switch {
	case old.Part == Merging:
		return fmt.Errorf("the study there is a merge that was broken off; merge again, or give --force to search anew")
	case old.Program != c.Program:
		return fmt.Errorf("the unfinished study there is by %.60s, this is %s; go on with that version, or give --force to begin anew", study.Clean(old.Program), c.Program)
	case old.Part != c.Part:
		return fmt.Errorf("the unfinished study there is %.60s, this run is %s; give the same --part, or --force to begin anew", part(old), part(c))
	case old.Brief != c.Brief:
		return fmt.Errorf("the unfinished study there is of another brief; give that brief, or --force to begin anew")
	case old.Seed != c.Seed:
		return fmt.Errorf("the unfinished study there has seed %d, this run %d; give the same seed, or --force to begin anew", old.Seed, c.Seed)
	case old.Prove != c.Prove:
		return fmt.Errorf("the unfinished study there proves %d designs, this run %d; give the same --prove, or --force to begin anew", old.Prove, c.Prove)
	case old.Budget != c.Budget:
		return fmt.Errorf("the unfinished study there was to run %d evaluations, this run %d; give the same number, or --force to begin anew", old.Budget, c.Budget)
	}
	return nil
}
