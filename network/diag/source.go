package diag

import (
	"bytes"
	"sort"
	"sync"
	"unicode/utf8"
)

// A Source is a text that problems point into. Name is what is shown, mostly
// the path as the user gave it. Neither field may change once a position has
// been asked for. A Source may be used by several goroutines.
type Source struct {
	Name string
	Text []byte

	once  sync.Once
	lines []mark // the first byte of each line
	marks []mark // a character boundary every markEvery bytes or so
}

// mark is a byte offset and the number of characters before it.
type mark struct{ offset, runes int }

// markEvery bounds the characters counted for one position, so that a file of
// many problems on one huge line is not counted through again and again.
const markEvery = 1024

// Position returns the line and the column of a byte offset, both counted from
// one. The column counts characters: a tab is one, a byte that is no UTF-8 is
// one. Lines end with "\n" or "\r\n". An offset inside a character gives the
// place of that character; an offset out of range is pulled into the text.
func (s *Source) Position(offset int) (line, column int) {
	offset = s.clamp(offset)
	s.once.Do(s.index)
	line = s.lineOf(offset)
	return line, s.runesBefore(offset) - s.lines[line-1].runes + 1
}

func (s *Source) clamp(offset int) int { return max(0, min(offset, len(s.Text))) }

// lineOf returns the number, from one, of the line that holds offset.
func (s *Source) lineOf(offset int) int {
	return sort.Search(len(s.lines), func(i int) bool { return s.lines[i].offset > offset })
}

// bounds returns where a line starts and where its text ends, the line end
// itself left out.
func (s *Source) bounds(line int) (start, end int) {
	start = s.lines[line-1].offset
	if line == len(s.lines) {
		return start, len(s.Text)
	}
	end = s.lines[line].offset - 1 // before "\n"
	return start, start + len(bytes.TrimSuffix(s.Text[start:end], []byte{'\r'}))
}

// runesBefore counts the characters that end at or before offset.
func (s *Source) runesBefore(offset int) int {
	i := sort.Search(len(s.marks), func(i int) bool { return s.marks[i].offset > offset }) - 1
	at := s.marks[i]
	for at.offset < offset {
		_, size := utf8.DecodeRune(s.Text[at.offset:])
		if at.offset+size > offset {
			break
		}
		at.offset += size
		at.runes++
	}
	return at.runes
}

// index walks once through the text and notes the lines and the marks.
func (s *Source) index() {
	var at mark
	s.lines = append(s.lines, at)
	s.marks = append(s.marks, at)
	for at.offset < len(s.Text) {
		c, size := rune(s.Text[at.offset]), 1
		if c >= utf8.RuneSelf {
			c, size = utf8.DecodeRune(s.Text[at.offset:])
		}
		at.offset += size
		at.runes++
		if c == '\n' {
			s.lines = append(s.lines, at)
		}
		if at.offset-s.marks[len(s.marks)-1].offset >= markEvery {
			s.marks = append(s.marks, at)
		}
	}
}
