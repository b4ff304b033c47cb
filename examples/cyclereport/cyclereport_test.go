package main

import (
	"bytes"
	"context"
	"encoding/csv"
	"encoding/xml"
	"errors"
	"flag"
	"image"
	"image/color"
	_ "image/png"
	"io"
	"math"
	"os"
	"path/filepath"
	"strconv"
	"strings"
	"testing"
)

var names = []string{"motion", "terms", "curve", "linkage", "hodograph", "poles", "band"}

// The pictures are there, not blank, and their figures fill them as they should.
func TestPictures(t *testing.T) {
	dir := t.TempDir()
	var out, errs bytes.Buffer
	if err := run(t.Context(), []string{"-out", dir, "-format", "png", "-n", "361"}, &out, &errs); err != nil {
		t.Fatal(err)
	}
	for _, name := range names {
		path := filepath.Join(dir, name+".png")
		if !strings.Contains(out.String(), path) {
			t.Errorf("%s is not told", path)
		}
		f, err := os.Open(path)
		if err != nil {
			t.Fatal(err)
		}
		img, _, err := image.Decode(f)
		f.Close()
		if err != nil {
			t.Fatalf("%s: %v", name, err)
		}
		size := img.Bounds()
		ink := inked(img)
		if size.Dx() < 600 || size.Dy() < 190 || size.Dy() > 1000 {
			t.Errorf("%s: size %v", name, size)
		}
		// coloured ink: the figure itself, without axes, which are black and grey
		if ink.Dx() < size.Dx()/4 || ink.Dy() < size.Dy()/8 {
			t.Errorf("%s: the figure covers %v of %v", name, ink, size)
		}
	}
	left, err := filepath.Glob(filepath.Join(dir, ".*.part*"))
	if err != nil || len(left) > 0 {
		t.Errorf("left behind: %v, %v", left, err)
	}
}

// inked returns the extent of what is neither grey nor white.
func inked(img image.Image) (r image.Rectangle) {
	b := img.Bounds()
	for y := b.Min.Y; y < b.Max.Y; y++ {
		for x := b.Min.X; x < b.Max.X; x++ {
			c := color.NRGBAModel.Convert(img.At(x, y)).(color.NRGBA)
			if max(c.R, c.G, c.B)-min(c.R, c.G, c.B) > 60 {
				r = r.Union(image.Rect(x, y, x+1, y+1))
			}
		}
	}
	return r
}

func TestSVG(t *testing.T) {
	dir := t.TempDir()
	if err := run(t.Context(), []string{"-out", dir, "-n", "91"}, io.Discard, io.Discard); err != nil {
		t.Fatal(err)
	}
	for _, name := range names {
		f, err := os.Open(filepath.Join(dir, name+".svg"))
		if err != nil {
			t.Fatal(err)
		}
		paths := 0
		for d := xml.NewDecoder(f); ; {
			token, err := d.Token()
			if err == io.EOF {
				break
			}
			if err != nil {
				t.Fatalf("%s: %v", name, err)
			}
			if e, ok := token.(xml.StartElement); ok && e.Name.Local == "path" {
				paths++
			}
		}
		f.Close()
		if paths < 10 {
			t.Errorf("%s has %d paths", name, paths)
		}
	}
}

// The table against the geometry of the drive: the lever points from (0, −0.3) to the
// crank pin, and the rod reaches from its end to the ram's guide.
func TestTable(t *testing.T) {
	dir := t.TempDir()
	if err := run(t.Context(), []string{"-out", dir, "-n", "37"}, io.Discard, io.Discard); err != nil {
		t.Fatal(err)
	}
	f, err := os.Open(filepath.Join(dir, "cycle.csv"))
	if err != nil {
		t.Fatal(err)
	}
	defer f.Close()
	rows, err := csv.NewReader(f).ReadAll()
	if err != nil || len(rows) != 38 {
		t.Fatalf("%d rows, %v", len(rows), err)
	}
	number := func(s string) float64 {
		x, err := strconv.ParseFloat(s, 64)
		if err != nil {
			t.Fatal(err)
		}
		return x
	}
	ram := func(turn float64) float64 {
		lever := math.Atan2(0.12*math.Sin(turn)+0.30, 0.12*math.Cos(turn))
		rise := 0.56 - 0.58*math.Sin(lever)
		return 0.58*math.Cos(lever) + math.Sqrt(0.04-rise*rise) + 0.05
	}
	for i, r := range rows[1:] {
		turn := number(r[0])
		if want := 2 * math.Pi * float64(i) / 36; math.Abs(turn-want) > 1e-15*want {
			t.Errorf("row %d at %v, want %v", i, turn, want)
		}
		const h = 1e-4
		speed := (ram(turn+h) - ram(turn-h)) / (2 * h) * 2 * math.Pi
		if math.Abs(number(r[3])-ram(turn)) > 1e-14 || math.Abs(number(r[4])-speed) > 1e-6 {
			t.Errorf("row %d: %v, want %v and %v", i, r, ram(turn), speed)
		}
		if band := number(r[6]); !(band > 0.05e-3 && band < 0.5e-3) {
			t.Errorf("row %d: band %v", i, band)
		}
	}
}

func TestConfig(t *testing.T) {
	text := string(sample)
	for _, c := range []struct{ why, old, new, want string }{
		{"a wrong field", `"speed"`, `"sped"`, "sped"},
		{"a wrong field of the design", `"slot"`, `"slott"`, "slott"},
		{"an unknown link", `"poles": "rod"`, `"poles": "rood"`, "rood"},
		{"a hole without a joint", `"x": 0.12, "y": 0}, "part"`, `"x": 0.13, "y": 0}, "part"`, "no joint"},
		{"a negative tolerance", `"by": 5e-5`, `"by": -5e-5`, "tolerances[0].by"},
		{"no cycle", `"to": 6.283185307179586`, `"to": 0`, "no cycle"},
		{"too short a rod", `"x": 0.20, "y": 0}, "b"`, `"x": 0.02, "y": 0}, "b"`, "rod"},
	} {
		if !strings.Contains(text, c.old) {
			t.Fatalf("%s: the sample has no %s", c.why, c.old)
		}
		path := filepath.Join(t.TempDir(), "mine.json")
		if err := os.WriteFile(path, []byte(strings.Replace(text, c.old, c.new, 1)), 0o644); err != nil {
			t.Fatal(err)
		}
		err := run(t.Context(), []string{"-config", path, "-out", t.TempDir(), "-n", "19"}, io.Discard, io.Discard)
		if err == nil || !strings.Contains(err.Error(), c.want) {
			t.Errorf("%s: %v, want %q in it", c.why, err, c.want)
		}
	}
}

func TestRefuses(t *testing.T) {
	for _, args := range [][]string{{"-n", "2"}, {"-format", "pdf"}, {"mine.json"}, {"-config", "none.json"}} {
		if err := run(t.Context(), append(args, "-out", t.TempDir()), io.Discard, io.Discard); err == nil {
			t.Errorf("%v is taken", args)
		}
	}
	var help bytes.Buffer
	if err := run(t.Context(), []string{"-h"}, io.Discard, &help); !errors.Is(err, flag.ErrHelp) || !strings.Contains(help.String(), "-config") {
		t.Errorf("help: %v, %s", err, help.String())
	}
	// a folder that can't be made
	file := filepath.Join(t.TempDir(), "file")
	if err := os.WriteFile(file, nil, 0o644); err != nil {
		t.Fatal(err)
	}
	if err := run(t.Context(), []string{"-out", filepath.Join(file, "report"), "-n", "19"}, io.Discard, io.Discard); err == nil || !strings.Contains(err.Error(), file) {
		t.Errorf("unwritable: %v", err)
	}
}

// An interrupt leaves whole files or none; so does a writer that fails.
func TestWholeOrNone(t *testing.T) {
	dir := t.TempDir()
	ctx, cancel := context.WithCancel(t.Context())
	cancel()
	if err := run(ctx, []string{"-out", dir, "-n", "91"}, io.Discard, io.Discard); !errors.Is(err, context.Canceled) {
		t.Errorf("interrupted: %v", err)
	}
	full := errors.New("no space left")
	path := filepath.Join(dir, "cycle.csv")
	err := writeWhole(path, func(w io.Writer) error {
		io.WriteString(w, "half a")
		return full
	})
	if !errors.Is(err, full) || !strings.Contains(err.Error(), path) {
		t.Errorf("full disk: %v", err)
	}
	if files, _ := os.ReadDir(dir); len(files) > 0 {
		t.Errorf("left behind: %v", files)
	}
}
