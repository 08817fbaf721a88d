package spectra

// Files as text: what is none and what it is instead, lines of comment, the way from another layout.

import (
	"bytes"
	"fmt"
	"io"
	"regexp"
	"strings"
)

// MaxBytes is the size beyond which a spectrum file is refused.
const MaxBytes = 64 << 20

// readText reads a text file of bounded size, without the mark of its byte order and with line ends
// that hold a line feed.
func readText(in io.Reader, file string) ([]byte, error) {
	text, err := io.ReadAll(io.LimitReader(in, MaxBytes+1))
	if err != nil {
		return nil, fmt.Errorf("%s: %w", file, err)
	}
	if problem := notText(text); problem != "" {
		return nil, Errors{{File: file, Text: problem}}
	}
	text = bytes.TrimPrefix(text, []byte("\ufeff"))
	if !bytes.ContainsRune(text, '\n') { // line ends of old files
		text = bytes.ReplaceAll(text, []byte("\r"), []byte("\n"))
	}
	return text, nil
}

// separatorIn returns the sign that separates cells in what should be heads between commas, or 0.
func separatorIn(heads []string) rune {
	joined := strings.Join(heads, ",")
	for _, c := range ";\t" {
		if strings.ContainsRune(joined, c) {
			return c
		}
	}
	return 0
}

// wayFrom says which command turns a file whose first row cannot be heads into one of ours; "" where
// that is not known.
func wayFrom(heads []string, text []byte) string {
	word := map[rune]string{';': "semicolon", '\t': "tab"}[separatorIn(heads)]
	if word == "" {
		return ""
	}
	way := "; to turn it: panewright spectrum FILE --separator " + word
	if decimalComma.Match(text) {
		way += " --decimal-comma"
	}
	if !strings.Contains(strings.Join(heads, ""), Wavelength+"_") {
		way += " --columns wavelength=1,tau=2"
	}
	return way + " -o NEW.csv"
}

// decimalComma finds a number with one.
var decimalComma = regexp.MustCompile(`[0-9],[0-9]`)

const (
	commentsKept   = 20
	commentLetters = 400 // that a line of comment is clipped to
)

// commentsOf returns the first lines of comment of a text, without the sign and without those that say
// nothing.
func commentsOf(text []byte) (list []string) {
	for line := range bytes.Lines(text) {
		s := string(bytes.TrimSpace(line[:min(len(line), maxLine)]))
		if rest, quoted := strings.CutPrefix(s, `"`); quoted { // as spreadsheets write it
			s = strings.TrimRight(rest, `",;`)
		}
		s, ok := strings.CutPrefix(s, "#")
		if s = strings.TrimSpace(s); !ok || s == "" {
			continue
		}
		if list = append(list, Clip(strings.ToValidUTF8(s, "\ufffd"), commentLetters)); len(list) == commentsKept {
			return list
		}
	}
	return list
}

// notText says what bytes are that cannot be a text in UTF-8, or returns "".
func notText(b []byte) string {
	begins := func(with string) bool { return bytes.HasPrefix(b, []byte(with)) }
	holds := func(name string) bool { return bytes.Contains(b[:min(len(b), 1<<20)], []byte(name)) }
	const asCSV = "; save the sheet as CSV in UTF-8"
	switch {
	case len(b) > MaxBytes:
		return fmt.Sprintf("larger than %d MB; a spectrum has some hundred rows", MaxBytes>>20)
	case begins("PK\x03\x04") && holds("xl/"):
		return "is a spreadsheet (XLSX)" + asCSV
	case begins("PK\x03\x04") && holds("opendocument.spreadsheet"):
		return "is a spreadsheet (ODS)" + asCSV
	case begins("PK\x03\x04"):
		return "is a ZIP archive, or a document in one; a spectrum is CSV text in UTF-8"
	case begins("\xd0\xcf\x11\xe0"):
		return "is a spreadsheet or a document in an old binary format (XLS)" + asCSV
	case begins("%PDF"):
		return "is a PDF; a spectrum is CSV text in UTF-8"
	case begins("\x1f\x8b"):
		return "is compressed (gzip); unpack it"
	case begins("\xff\xfe"), begins("\xfe\xff"):
		return "is UTF-16; save it as UTF-8"
	case bytes.IndexByte(b, 0) >= 0:
		return "is binary, or UTF-16; a spectrum is CSV text in UTF-8"
	}
	return ""
}
