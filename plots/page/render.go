package page

import (
	"bytes"
	"crypto/sha256"
	_ "embed"
	"encoding/base64"
	"errors"
	"fmt"
	"html/template"
	"io"
	"slices"
	"strings"
)

//go:embed page.tmpl.html
var layout string

//go:embed page.css
var style string

//go:embed page.js
var script string

var parsed = template.Must(template.New("page").Parse(layout))

// Write writes the page. Nothing is written if it fails.
func Write(w io.Writer, r *Report) error {
	if clean(r.Title) == "" {
		return errors.New("a report wants a title")
	}
	l := layer{ids: cardIDs(r)}
	v, err := l.report(r)
	if err != nil {
		return fmt.Errorf("report %q: %w", clean(r.Title), err)
	}
	if err := v.seal(r, l.styles); err != nil {
		return fmt.Errorf("report %q: %w", clean(r.Title), err)
	}
	var b bytes.Buffer
	if err := parsed.Execute(&b, v); err != nil {
		return fmt.Errorf("report %q: %w", clean(r.Title), err)
	}
	_, err = w.Write(b.Bytes())
	return err
}

// seal fills in the styles and scripts, and the policy that names them.
func (v *reportView) seal(r *Report, lifted []string) error {
	styles := append([]string{style}, lifted...)
	for _, s := range r.Styles {
		styles = append(styles, string(s))
	}
	scripts := []string{script}
	for _, s := range r.Scripts {
		scripts = append(scripts, string(s))
	}
	css, cssHashes, err := elements("style", styles)
	if err != nil {
		return err
	}
	js, jsHashes, err := elements("script", scripts)
	if err != nil {
		return err
	}
	v.Style, v.Script = css, js
	v.Policy = "default-src 'none'; img-src data:; style-src " + cssHashes + "; script-src " + jsHashes + "; base-uri 'none'; form-action 'none'"
	return nil
}

// elements writes each text once in an element of its own, and gives their
// hashes for the policy. The hash is of the very bytes between the tags, in
// which a browser turns CR into LF.
func elements(tag string, texts []string) (template.HTML, string, error) {
	var b strings.Builder
	var hashes, seen []string
	for _, s := range texts {
		s = strings.ReplaceAll(strings.ReplaceAll(s, "\r\n", "\n"), "\r", "\n")
		if slices.Contains(seen, s) || s == "" {
			continue
		}
		if low := strings.ToLower(s); strings.Contains(low, "</"+tag) || strings.Contains(low, "<!--") || strings.ContainsRune(s, 0) {
			return "", "", fmt.Errorf("a %s that would end its element", tag)
		}
		seen = append(seen, s)
		sum := sha256.Sum256([]byte(s))
		hashes = append(hashes, "'sha256-"+base64.StdEncoding.EncodeToString(sum[:])+"'")
		fmt.Fprintf(&b, "<%s>%s</%s>\n", tag, s, tag)
	}
	return template.HTML(b.String()), strings.Join(hashes, " "), nil
}
