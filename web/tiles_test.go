package web

import (
	"bytes"
	"fmt"
	"image"
	"image/png"
	"math"
	"net/http"
	"strings"
	"testing"

	"github.com/paulmach/orb"
)

// tileAt returns the address of the tile that holds a place, by the textbook formula of the Mercator
// map, and the pixel in it.
func tileAt(template string, z int, p orb.Point) (address string, col, row float64) {
	size, lat := math.Exp2(float64(z)), p.Lat()*math.Pi/180
	x := (p.Lon() + 180) / 360 * size
	y := (1 - math.Log(math.Tan(lat)+1/math.Cos(lat))/math.Pi) / 2 * size
	address = strings.NewReplacer("{z}", fmt.Sprint(z), "{x}", fmt.Sprint(int(x)), "{y}", fmt.Sprint(int(y))).Replace(template)
	return address, (x-math.Floor(x))*256 - 0.5, (y-math.Floor(y))*256 - 0.5
}

func tile(t testing.TB, s http.Handler, address string) image.Image {
	t.Helper()
	a := ask(s, http.MethodGet, address, "")
	if a.status != http.StatusOK {
		t.Fatalf("%s: status %d: %s", address, a.status, a.body)
	}
	picture, err := png.Decode(bytes.NewReader(a.body))
	if err != nil {
		t.Fatal(err)
	}
	if size := picture.Bounds().Size(); size != (image.Point{256, 256}) {
		t.Fatalf("%s has %v pixels", address, size)
	}
	return picture
}

// heightOf reads a pixel as map libraries do: red*256 + green + blue/256 - 32768.
func heightOf(picture image.Image, col, row int) float64 {
	r, g, b, _ := picture.At(col, row).RGBA()
	return float64(r>>8)*256 + float64(g>>8) + float64(b>>8)/256 - 32768
}

// TestTileHeights compares tiles with the raster at known places: the demo's sites, in every zoom at
// which pixels are finer than cells. A site lies within a pixel and the ground there rises by less than
// one in two, so half a cell's rise is allowed.
func TestTileHeights(t *testing.T) {
	s := serve(t, demo(t))
	ground, plan := get[GroundAnswer](t, s, "/api/ground"), get[PlanAnswer](t, s, "/api/plan")
	if ground.MaxZoom != 12 { // 26 m a pixel at 47.5 degrees north: the first below 30 m
		t.Errorf("the greatest zoom is %d, want 12", ground.MaxZoom)
	}
	for _, site := range plan.Sites {
		for z := ground.MaxZoom; z <= ground.MaxZoom+3; z++ {
			address, col, row := tileAt(ground.Tiles, z, orb.Point{site.Place.Lon, site.Place.Lat})
			got := heightOf(tile(t, s, address), int(math.Round(min(max(col, 0), 255))), int(math.Round(min(max(row, 0), 255))))
			if math.Abs(got-*site.GroundM) > 7.5 {
				t.Errorf("%s, zoom %d: %.2f m in the tile, %.2f m in the raster", site.Name, z, got, *site.GroundM)
			}
		}
	}
}

// TestTileEdges looks along the seam of neighbouring tiles: the step over it is like the steps beside it.
func TestTileEdges(t *testing.T) {
	s := serve(t, demo(t))
	ground := get[GroundAnswer](t, s, "/api/ground")
	for _, z := range []int{9, 10, 11, 12, 13} {
		left, _, _ := tileAt(ground.Tiles, z, orb.Point{-20.07, 47.55})
		var x int
		parts := strings.Split(left, "/")
		fmt.Sscan(parts[len(parts)-2], &x)
		parts[len(parts)-2] = fmt.Sprint(x + 1)
		a, b := tile(t, s, left), tile(t, s, strings.Join(parts, "/"))
		var over, beside float64
		for row := range 256 {
			over += math.Abs(heightOf(b, 0, row) - heightOf(a, 255, row))
			beside += math.Abs(heightOf(a, 255, row)-heightOf(a, 254, row)) + math.Abs(heightOf(b, 1, row)-heightOf(b, 0, row))
		}
		if over > beside+1 {
			t.Errorf("zoom %d: heights step by %.1f m over the seam and by %.1f m beside it", z, over/256, beside/512)
		}
	}
}

// TestTileHoles serves a plan whose ground ends in nothing: black in the ordinary tiles, the least
// height in the filled ones.
func TestTileHoles(t *testing.T) {
	path := demo(t)
	write(t, path, strings.Replace(demoText(t), "beyond: sea", "beyond: void", 1))
	s := serve(t, path)
	ground := get[GroundAnswer](t, s, "/api/ground")
	far := orb.Point{-25, 40}
	address, _, _ := tileAt(ground.Tiles, 8, far)
	if r, g, b, a := tile(t, s, address).At(9, 9).RGBA(); r != 0 || g != 0 || b != 0 || a != 0xffff {
		t.Errorf("nothing is drawn as %d %d %d, opacity %d", r, g, b, a)
	}
	address, _, _ = tileAt(ground.Filled, 8, far)
	if got := heightOf(tile(t, s, address), 9, 9); math.Abs(got-ground.MinM) > 1.0/256 {
		t.Errorf("a filled hole lies at %g m, want %g m", got, ground.MinM)
	}
}

func TestTileAnswers(t *testing.T) {
	path := demo(t)
	s := serve(t, path)
	ground := get[GroundAnswer](t, s, "/api/ground")
	address, _, _ := tileAt(ground.Tiles, 10, orb.Point{-20.07, 47.55})
	a := ask(s, http.MethodGet, address, "")
	if got := a.header.Get("Cache-Control"); !strings.Contains(got, "immutable") {
		t.Errorf("Cache-Control is %q", got)
	}
	if again := ask(s, http.MethodGet, address, "", "If-None-Match", a.header.Get("ETag")); again.status != http.StatusNotModified || len(again.body) != 0 {
		t.Errorf("a tile that is known comes with status %d and %d bytes", again.status, len(again.body))
	}
	if head := ask(s, http.MethodHead, address, ""); head.status != http.StatusOK {
		t.Errorf("HEAD has status %d", head.status)
	}
	id := strings.Split(ground.Tiles, "/")[3]
	for _, bad := range []string{"ground/" + id + "/30/0/0.png", "ground/" + id + "/3/8/0.png", "ground/" + id + "/3/-1/0.png", "ground/" + id + "/x/0/0.png", "hills/" + id + "/3/0/0.png", "ground/0123/3/0/0.png", "ground/..%2f..%2fetc/3/0/0.png"} {
		refused(t, ask(s, http.MethodGet, "/tiles/"+bad, ""), http.StatusNotFound, "")
	}
	// Another ground has other addresses: the same files with something else around them.
	write(t, path, strings.Replace(demoText(t), "beyond: sea", "beyond: void", 1))
	if other := get[GroundAnswer](t, s, "/api/ground"); other.Tiles == ground.Tiles || other.Beyond != "void" {
		t.Errorf("the addresses stay %s", other.Tiles)
	}
	if still := ask(s, http.MethodGet, address, ""); still.status != http.StatusOK {
		t.Errorf("the tile of before has status %d", still.status)
	}
}

// TestTileStore checks that the store keeps to its limit and throws out what was not asked for longest.
func TestTileStore(t *testing.T) {
	store := newTileStore(100)
	drawn := 0
	draw := func() ([]byte, error) { drawn++; return make([]byte, 30), nil }
	at := func(x int) tileAddress { return tileAddress{x: x} }
	for _, x := range []int{1, 2, 3, 1, 4, 1, 3, 2} { // 4 throws out 2; 2 throws out 4
		if _, err := store.get(at(x), draw); err != nil {
			t.Fatal(err)
		}
	}
	if drawn != 5 || store.bytes != 90 || store.tiles[at(4)] != nil || len(store.tiles) != 3 {
		t.Errorf("%d tiles drawn, %d bytes in %d tiles kept", drawn, store.bytes, len(store.tiles))
	}
	if _, err := store.get(at(9), func() ([]byte, error) { return nil, http.ErrAbortHandler }); err == nil || store.tiles[at(9)] != nil {
		t.Error("a tile that failed is kept")
	}
}

// BenchmarkTiles serves tiles of the demo at its greatest zoom, drawn anew and from memory.
func BenchmarkTiles(b *testing.B) {
	s := serve(b, demo(b))
	ground := get[GroundAnswer](b, s, "/api/ground")
	for _, warm := range []string{"cold", "warm"} {
		b.Run(warm, func(b *testing.B) {
			b.ReportAllocs()
			for i := 0; b.Loop(); i++ {
				if warm == "cold" {
					s.tiles = newTileStore(tileStoreBytes)
				}
				address, _, _ := tileAt(ground.Tiles, ground.MaxZoom, orb.Point{-20.4 + 0.05*float64(i%12), 47.5})
				if a := ask(s, http.MethodGet, address, ""); a.status != http.StatusOK {
					b.Fatalf("status %d", a.status)
				}
			}
		})
	}
}
