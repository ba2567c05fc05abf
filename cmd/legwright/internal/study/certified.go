package study

import (
	"crypto/sha256"
	"encoding/hex"
	"os"
	"path/filepath"
)

// Certified gives designs of the front that it says nothing proved of what certificates beside their files say: those that are of
// that very file and of the brief with the hash. Others are passed over.
func (f *Folder) Certified(front *Front, brief string) {
	found := false
	for i := range front.Designs {
		d := &front.Designs[i]
		if d.Proof != nil {
			continue
		}
		file := filepath.Join(f.dir, filepath.FromSlash(designName(d.ID)))
		b, err := os.ReadFile(file + CertificateEnding)
		if err != nil {
			continue
		}
		text, err := os.ReadFile(file)
		if err != nil {
			continue
		}
		c, err := ReadCertificate(b)
		sum := sha256.Sum256(text)
		if err != nil || c.Design != hex.EncodeToString(sum[:]) || c.Brief != brief {
			continue
		}
		d.Proof = c.Proof()
		found = true
	}
	if found {
		Rank(front, front.Weights) // for the marks
	}
}
