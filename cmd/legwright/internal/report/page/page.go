// Package page makes the report page of a study: one HTML file that holds its data, its drawings and
// its script, works from the file system and asks nothing of any network.
package page

import (
	"bytes"
	"crypto/sha256"
	"embed"
	"encoding/base64"
	"encoding/json"
	"fmt"
	"strings"

	"legwright/cmd/legwright/internal/sheet"
)

//go:embed assets
var assets embed.FS

// The parts of the page in the order in which they go into it. All scripts share one scope.
var (
	styles  = []string{"paper.css", "drawing.css", "print.css"}
	scripts = []string{"dom.js", "quantity.js", "topsis.js", "model.js", "store.js", "signs.js", "camera.js", "posture.js",
		"machine.js", "first.js", "study.js", "scatter.js", "rail.js", "parallel.js", "weights.js", "windowed.js", "ranked.js", "poses.js",
		"legs.js", "limits.js", "excursions.js", "map.js", "sheet.js", "compare.js", "handover.js", "main.js"}
)

// WritePage is the page of the data, UTF-8. Texts of the data reach the document as text only: they are
// in a block of JSON in which no letter can end a script, and the script sets them as text. The
// policy in the page allows this one script and this one style by their hashes, images inside the file,
// and nothing else.
func WritePage(d *sheet.Data) ([]byte, error) {
	data, err := json.Marshal(d) // escapes <, >, &, U+2028 and U+2029
	if err != nil {
		return nil, fmt.Errorf("the report page: %w", err)
	}
	style := join(styles)
	script := "\"use strict\";\n(() => {\n" + join(scripts) + "})();\n"
	policy := "default-src 'none'; script-src " + hash(script) + "; style-src " + hash(style) +
		"; img-src data:; base-uri 'none'; form-action 'none'"
	var b bytes.Buffer
	rest := read("shell.html")
	for _, part := range []struct{ name, text string }{{"policy", policy}, {"style", style}, {"data", string(data)}, {"script", script}} {
		before, after, ok := strings.Cut(rest, "{{"+part.name+"}}")
		if !ok {
			panic("page: the shell lacks a part")
		}
		b.WriteString(before)
		b.WriteString(part.text)
		rest = after
	}
	b.WriteString(rest)
	return b.Bytes(), nil
}

// join is the text of embedded files, one after the other.
func join(names []string) string {
	var b strings.Builder
	for _, n := range names {
		b.WriteString(read(n))
	}
	return b.String()
}

func read(name string) string {
	b, err := assets.ReadFile("assets/" + name)
	if err != nil {
		panic("page: an embedded file is missing")
	}
	return strings.ReplaceAll(string(b), "\r\n", "\n") // as the parser of the browser does before it hashes
}

// hash is a source expression of the policy that allows a text.
func hash(text string) string {
	sum := sha256.Sum256([]byte(text))
	return "'sha256-" + base64.StdEncoding.EncodeToString(sum[:]) + "'"
}
