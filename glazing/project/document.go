package project

// What is checked of a project file, or a limits file, before its keys are: that it is text, and
// YAML.

import (
	"bytes"
	"errors"
	"fmt"
	"panewright/spectra"
	"reflect"
	"strconv"
	"strings"
	"unicode"
	"unicode/utf16"
	"unicode/utf8"

	"go.yaml.in/yaml/v4"
)

// maxProjectBytes is the size beyond which a project file is refused.
const maxProjectBytes = 16 << 20

// A kind is what a file is, for messages: with an article, and how it begins.
type kind struct{ name, begins string }

var (
	aProject    = kind{"a project", "project: TITLE"}
	aLimitsFile = kind{"a limits file", "limits:"}
)

// isEmpty says that a file of the kind holds nothing.
func (k kind) isEmpty() string { return "is empty; " + k.name + " begins with " + k.begins }

// parse reads the text of a file into a spec type. It returns false where nothing could be read.
func (r *reader) parse(content []byte, into any) bool {
	if at, problem := r.kind.notText(content); problem != "" {
		r.fail(at, "", "%s", problem)
		return false
	}
	var doc yaml.Node
	if err := yaml.Load(joinSurrogates(content), &doc); err != nil {
		r.fail(r.kind.yamlFault(content, err))
		return false
	}
	if len(doc.Content) == 0 {
		r.fail(position{}, "", "%s", r.kind.isEmpty())
		return false
	}
	if r.plain(doc.Content[0], "") {
		r.object(doc.Content[0], reflect.ValueOf(into).Elem(), "")
	}
	return true
}

// joinSurrogates writes out the pairs of escapes by which JSON names letters beyond U+FFFF, such
// as \ud83d\ude00, for YAML has one escape for these. Other content is returned as it is.
func joinSurrogates(content []byte) []byte {
	if !bytes.HasPrefix(bytes.TrimSpace(content), []byte("{")) || !bytes.Contains(bytes.ToLower(content), []byte(`\ud`)) {
		return content
	}
	const pair = len(`\ud83d\ude00`)
	var out []byte
	for len(content) > 0 {
		n := 1
		if content[0] == '\\' && len(content) > 1 {
			n = 2 // an escape is taken whole, so that \\ud83d stays what it is
		}
		if len(content) >= pair && content[0] == '\\' && content[1] == 'u' && content[6] == '\\' && content[7] == 'u' {
			high, err1 := strconv.ParseUint(string(content[2:6]), 16, 16)
			low, err2 := strconv.ParseUint(string(content[8:12]), 16, 16)
			if c := utf16.DecodeRune(rune(high), rune(low)); err1 == nil && err2 == nil && c != utf8.RuneError {
				out, content = utf8.AppendRune(out, c), content[pair:]
				continue
			}
		}
		out, content = append(out, content[:n]...), content[n:]
	}
	return out
}

// notText says why content cannot be YAML in UTF-8, and where.
func (k kind) notText(b []byte) (position, string) {
	switch {
	case len(b) > maxProjectBytes:
		return position{}, fmt.Sprintf("is larger than %d MB; %s is a few kB", maxProjectBytes>>20, k.name)
	case bytes.HasPrefix(b, []byte{0xff, 0xfe}), bytes.HasPrefix(b, []byte{0xfe, 0xff}):
		return position{}, "is UTF-16; save it as UTF-8"
	case bytes.IndexByte(b, 0) >= 0:
		return position{}, "is binary, or UTF-16; " + k.name + " is YAML text in UTF-8"
	case len(bytes.TrimSpace(bytes.TrimPrefix(b, []byte("\ufeff")))) == 0:
		return position{}, k.isEmpty()
	}
	line, column := 1, 1
	for rest := b; len(rest) > 0; {
		c, size := utf8.DecodeRune(rest)
		if c == utf8.RuneError && size == 1 {
			return position{line, column}, "holds bytes that are not UTF-8; save it as UTF-8"
		}
		if c != '\n' && c != '\r' && c != '\t' && c != 0x85 && unicode.IsControl(c) {
			return position{line, column}, fmt.Sprintf("holds the control character U+%04X", c)
		}
		if column++; c == '\n' {
			line, column = line+1, 1
		}
		rest = rest[size:]
	}
	return position{}, ""
}

// longest is how many letters of a message of the YAML library are shown: it may quote the file.
const longest = 300

// yamlFault turns an error of the YAML library into the arguments of fail.
func (k kind) yamlFault(content []byte, err error) (position, string, string, error) {
	const format = "not readable as YAML: %v"
	if le, ok := errors.AsType[*yaml.LoadError](err); ok {
		message := strings.TrimPrefix(le.Message, "yaml: ")
		switch {
		case strings.HasPrefix(message, "unknown anchor"):
			message = "anchors and aliases are not used in " + k.name + "; write the value out"
		case strings.Contains(message, "exceeded max depth"):
			message = "lists or maps are nested too deeply"
		case strings.Contains(message, "cannot start any token"), strings.Contains(message, "tab character"):
			message += " (a tab? indent with spaces)"
		case strings.HasPrefix(message, "did not find expected"):
			message += " (a bracket or quote left open, or a line indented wrongly, here or above?)"
		case strings.HasPrefix(message, "expected single document"):
			line := bytes.Count(content[:secondDocument(content)], []byte("\n")) + 1
			return position{line, 1}, "", "%v", errors.New("a second document begins here; " + k.name + " is one, without ---")
		case strings.HasPrefix(message, "no documents"):
			return position{}, "", "%v", errors.New(k.isEmpty())
		}
		return position{le.Mark.Line, le.Mark.Column}, "", format, errors.New(spectra.Clip(message, longest))
	}
	return position{}, "", format, errors.New(spectra.Clip(err.Error(), longest))
}

// secondDocument returns where the line is that begins a second document.
func secondDocument(content []byte) int {
	at, begun := 0, false
	for line := range bytes.Lines(content) {
		switch text := bytes.TrimSpace(line); {
		case bytes.HasPrefix(line, []byte("---")) && begun:
			return at
		case len(text) > 0 && text[0] != '#' && text[0] != '%':
			begun = true
		}
		at += len(line)
	}
	return 0
}
