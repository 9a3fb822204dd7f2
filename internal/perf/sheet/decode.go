package sheet

import (
	"bytes"
	"fmt"
	"strings"
	"unicode/utf16"
	"unicode/utf8"
)

// Decode turns bytes into text and says in words how they were encoded.
func Decode(b []byte) (text, encoding string, err error) {
	switch {
	case len(b) > MaxBytes:
		return "", "", fmt.Errorf("%w: %d bytes, and at most %d are read", ErrTooLarge, len(b), MaxBytes)
	case bytes.HasPrefix(b, []byte("PK\x03\x04")), bytes.HasPrefix(b, []byte{0xd0, 0xcf, 0x11, 0xe0}):
		return "", "", fmt.Errorf("%w but a spreadsheet program's own file; save the sheet as CSV there and import that", ErrNotText)
	case bytes.HasPrefix(b, []byte{0xef, 0xbb, 0xbf}):
		b, encoding = b[3:], "UTF-8 with a mark"
		if !utf8.Valid(b) {
			return "", "", fmt.Errorf("%w: it is marked as UTF-8 and has bytes that are none", ErrNotText)
		}
		text = string(b)
	case bytes.HasPrefix(b, []byte{0xff, 0xfe}):
		text, encoding = decodeUTF16(b[2:], 0, 1), "UTF-16, low byte first"
	case bytes.HasPrefix(b, []byte{0xfe, 0xff}):
		text, encoding = decodeUTF16(b[2:], 1, 0), "UTF-16, high byte first"
	case utf8.Valid(b):
		text, encoding = string(b), "UTF-8"
	default:
		text, encoding = decodeLatin(b), "not UTF-8, so read as Latin-1 (Windows-1252)"
	}
	if strings.ContainsRune(text, 0) {
		return "", "", fmt.Errorf("%w: it has zero bytes", ErrNotText)
	}
	if strings.TrimSpace(text) == "" {
		return "", "", ErrEmpty
	}
	return text, encoding, nil
}

// decodeUTF16 reads pairs of bytes of which the low one stands at place low; a
// byte left over at the end becomes the replacement character.
func decodeUTF16(b []byte, low, high int) string {
	list := make([]uint16, 0, len(b)/2+1)
	for ; len(b) >= 2; b = b[2:] {
		list = append(list, uint16(b[low])|uint16(b[high])<<8)
	}
	if len(b) == 1 {
		list = append(list, utf8.RuneError)
	}
	return string(utf16.Decode(list))
}

// windows1252 are the signs of the bytes 0x80 to 0x9f, which Latin-1 leaves to controls
// (Unicode consortium, mappings of vendors, CP1252; from memory). Bytes without a sign give the replacement character.
var windows1252 = [32]rune{
	'€', utf8.RuneError, '‚', 'ƒ', '„', '…', '†', '‡', 'ˆ', '‰', 'Š', '‹', 'Œ', utf8.RuneError, 'Ž', utf8.RuneError,
	utf8.RuneError, '‘', '’', '“', '”', '•', '–', '—', '˜', '™', 'š', '›', 'œ', utf8.RuneError, 'ž', 'Ÿ',
}

func decodeLatin(b []byte) string {
	var text strings.Builder
	for _, c := range b {
		if c >= 0x80 && c < 0xa0 {
			text.WriteRune(windows1252[c-0x80])
			continue
		}
		text.WriteRune(rune(c))
	}
	return text.String()
}
