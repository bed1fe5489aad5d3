package main

import (
	"bytes"
	"fmt"
	"image"
	"os"
	"slices"
	"strconv"
	"strings"
	"testing"
	"time"
)

// Places and colours in a light window of 1280x800 at 100 % text, with its menu.
var (
	badgePlace  = image.Rect(8, 36, 72, 96)
	columnPlace = image.Rect(4, 100, 300, 770)
	chartPlace  = image.Rect(320, 195, 1264, 600) // the picture of the page Ceiling
)

const lightBlue = 0x004488

// The handle of a slider is 4 by 22; the outline of the field with the focus is
// higher.
var handleWide, handleHigh = span{3, 5}, span{19, 23}

// What the program should take is not asserted, since other work runs on the same
// machine; only what nobody would wait for is.
const (
	absurdStart  = 10 * time.Second
	absurdDrag   = time.Second
	absurdMemory = 450 // MB
)

// Every knob of the demo is dragged by its slider, a step as soon as the picture of
// the one before is there: the time from the movement of the pointer to the pixels
// of the field, and to those of the picture.
func TestDragInTheWindow(t *testing.T) {
	needScreen(t)
	f := openFramebuffer(t)
	s := start(t, "skerry-demo", "--size", "1280x800", "--variant", "light", "--text-scale", "1", "--page", "Ceiling")
	s.waitFor("verdict", func() bool { return f.count(badgePlace, lightBlue) > 200 })
	before := s.residentMB()
	const knobs, steps = 6, 12
	s.keys("Tab")
	var echoes, pictures []time.Duration
	for range knobs {
		s.keys("Tab")
		echo, picture := s.dragSlider(f, steps)
		echoes, pictures = append(echoes, echo...), append(pictures, picture...)
		s.keys("Escape")
	}
	s.do("xdotool", "mousemove", "700", "700")
	t.Logf("%d steps of %d knobs: field after %v (p95 %v), picture after %v (p95 %v); resident %d MB, then %d MB",
		len(echoes), knobs, median(echoes), p95(echoes), median(pictures), p95(pictures), before, s.residentMB())
	if got := median(pictures); got > absurdDrag {
		t.Errorf("the picture follows the pointer after %v, want 120 ms, at most %v", got, absurdDrag)
	}
	if got := s.residentMB(); got > absurdMemory {
		t.Errorf("%d MB are resident after the drags, want 300 MB, at most %d", got, absurdMemory)
	}
	s.keys("ctrl+q", "Tab", "Return") // the second button does not save
	s.awaitEnd()
}

// dragSlider drags the slider that is open to and fro, and puts the knob back.
func (s *screen) dragSlider(f *framebuffer, steps int) (echoes, pictures []time.Duration) {
	s.Helper()
	var handle image.Point
	s.waitFor("slider that stands still", func() bool {
		at, found := f.bar(columnPlace, handleWide, handleHigh)
		still := found && at == handle
		handle = at
		if !still {
			time.Sleep(100 * time.Millisecond)
		}
		return still
	})
	s.rest(f)
	field := image.Rect(columnPlace.Min.X, handle.Y-60, columnPlace.Max.X, handle.Y-18) // out of the pointer's way
	s.pointer(handle.X, handle.Y+4)
	s.do("xdotool", "mousedown", "1")
	s.rest(f)
	direction := 1
	if handle.X > columnPlace.Max.X/2 {
		direction = -1
	}
	for i := range steps {
		const step = 8
		x := handle.X + direction*step*(1+i%(steps/2))
		oldField, oldPicture := f.read(field), f.read(chartPlace)
		began := time.Now()
		s.pointer(x, handle.Y+4)
		echoes = append(echoes, s.changed(f, field, oldField, began))
		pictures = append(pictures, s.changed(f, chartPlace, oldPicture, began))
	}
	s.do("xdotool", "mouseup", "1")
	s.rest(f)
	s.keys("ctrl+z")
	s.rest(f)
	return echoes, pictures
}

func (s *screen) pointer(x, y int) {
	s.Helper()
	s.do("xdotool", "mousemove", strconv.Itoa(x), strconv.Itoa(y))
}

// changed waits until a part of the screen is not as it was.
func (s *screen) changed(f *framebuffer, part image.Rectangle, old []byte, began time.Time) time.Duration {
	s.Helper()
	for bytes.Equal(f.read(part), old) {
		if time.Since(began) > patience {
			s.Fatalf("nothing changed in %v within %v", part, patience)
		}
		time.Sleep(time.Millisecond)
	}
	return time.Since(began)
}

// rest waits until the screen has stood still for longer than the pictures wait to
// be drawn in full.
func (s *screen) rest(f *framebuffer) {
	s.Helper()
	const still = 400 * time.Millisecond
	last, since := f.read(image.Rectangle{Max: f.size}), time.Now()
	s.waitFor("rest", func() bool {
		now := f.read(image.Rectangle{Max: f.size})
		if !bytes.Equal(now, last) {
			last, since = now, time.Now()
		}
		return time.Since(since) > still
	})
}

// From the start of the program to its first verdict, and what it has resident then;
// the second start, with the files it reads in the cache of the system.
func TestStartToVerdict(t *testing.T) {
	needScreen(t)
	f := openFramebuffer(t)
	var took time.Duration
	var memory int
	for range 2 {
		began := time.Now()
		s := start(t, "skerry-demo", "--size", "1280x800", "--variant", "light", "--text-scale", "1")
		for f.count(badgePlace, lightBlue) <= 200 {
			if time.Since(began) > patience {
				t.Fatalf("no verdict within %v", patience)
			}
			time.Sleep(2 * time.Millisecond)
		}
		took = time.Since(began)
		s.rest(f)
		memory = s.residentMB()
		s.quit()
	}
	t.Logf("first verdict after %v, %d MB resident", took.Round(time.Millisecond), memory)
	if took > absurdStart {
		t.Errorf("the first verdict comes after %v, want 2 s, at most %v", took, absurdStart)
	}
	if memory > absurdMemory {
		t.Errorf("%d MB are resident, want 300 MB, at most %d", memory, absurdMemory)
	}
}

// residentMB is what the program has resident, in MB.
func (s *screen) residentMB() int {
	s.Helper()
	data, err := os.ReadFile(fmt.Sprintf("/proc/%d/status", s.command.Process.Pid))
	if err != nil {
		s.Fatal(err)
	}
	for _, line := range strings.Split(string(data), "\n") {
		var kB int
		if n, _ := fmt.Sscanf(line, "VmRSS: %d kB", &kB); n == 1 {
			return kB / 1000
		}
	}
	s.Fatal("the system does not tell what is resident")
	return 0
}

func median(list []time.Duration) time.Duration { return quantile(list, 50) }

func p95(list []time.Duration) time.Duration { return quantile(list, 95) }

// quantile is the time that so many of a hundred stay below.
func quantile(list []time.Duration, percent int) time.Duration {
	sorted := slices.Sorted(slices.Values(list))
	return sorted[min(len(sorted)*percent/100, len(sorted)-1)].Round(100 * time.Microsecond)
}
