package xlsx

import (
	"archive/zip"
	"bytes"
	"compress/flate"
	"errors"
	"hash"
	"hash/crc32"
	"io"
	"io/fs"
	"regexp"
	"sort"
	"strings"

	"github.com/xuri/excelize/v2"
)

// An archive is a zip writer whose parts come out sorted by name, whatever the order in which they were
// created, so that one run always gives one file: the spreadsheet library creates some parts, and lists some
// content types, in the order of a Go map. Parts are kept compressed until the archive is closed.
type archive struct {
	out   io.Writer
	parts []*entry
}

// An entry is one part of the archive.
type entry struct {
	header   zip.FileHeader
	packed   bytes.Buffer
	deflater *flate.Writer
	sum      hash.Hash32
}

const (
	contentTypes = "[Content_Types].xml"
	packing      = 5 // level of compression: beyond it files hardly shrink
)

func newArchive(w io.Writer) excelize.ZipWriter { return &archive{out: w} }

// Create begins a part; it may be written to until the next one is created.
func (a *archive) Create(name string) (io.Writer, error) {
	e := &entry{header: zip.FileHeader{Name: name, Method: zip.Deflate}, sum: crc32.NewIEEE()}
	var err error
	if e.deflater, err = flate.NewWriter(&e.packed, packing); err != nil {
		return nil, err
	}
	a.parts = append(a.parts, e)
	if name == contentTypes {
		return &sortedTypes{e}, nil
	}
	return e, nil
}

// AddFS is part of the contract with the spreadsheet library, which does not call it.
func (a *archive) AddFS(fs.FS) error { return errors.New("a spreadsheet takes no folder of files") }

// Close writes the archive, the list of content types first as readers expect.
func (a *archive) Close() error {
	sort.SliceStable(a.parts, func(i, j int) bool {
		p, q := a.parts[i].header.Name, a.parts[j].header.Name
		if (p == contentTypes) != (q == contentTypes) {
			return p == contentTypes
		}
		return p < q
	})
	z := zip.NewWriter(a.out)
	for _, e := range a.parts {
		if err := e.writeTo(z); err != nil {
			return err
		}
	}
	return z.Close()
}

func (e *entry) Write(p []byte) (int, error) {
	e.sum.Write(p)
	e.header.UncompressedSize64 += uint64(len(p))
	return e.deflater.Write(p)
}

func (e *entry) writeTo(z *zip.Writer) error {
	if err := e.deflater.Close(); err != nil {
		return err
	}
	e.header.CRC32, e.header.CompressedSize64 = e.sum.Sum32(), uint64(e.packed.Len())
	w, err := z.CreateRaw(&e.header)
	if err != nil {
		return err
	}
	_, err = e.packed.WriteTo(w)
	return err
}

// sortedTypes sorts the default types in the list of content types, which comes in one write.
type sortedTypes struct{ *entry }

var defaultTypes = regexp.MustCompile(`(<Default [^>]*></Default>)+`)

func (s *sortedTypes) Write(p []byte) (int, error) {
	sorted := defaultTypes.ReplaceAllStringFunc(string(p), func(list string) string {
		items := strings.SplitAfter(strings.TrimSuffix(list, "</Default>"), "</Default>")
		items[len(items)-1] += "</Default>"
		sort.Strings(items)
		return strings.Join(items, "")
	})
	if _, err := s.entry.Write([]byte(sorted)); err != nil {
		return 0, err
	}
	return len(p), nil
}
