package web

import (
	"encoding/json"
	"fmt"
	"net/http"
	"runtime"
	"slices"
	"testing"
	"time"

	"fellreach/link/plan"
)

// BenchmarkTry measures what a person waits for while something is dragged: one link of the demo at
// the median and at the 95th percentile, over HTTP's layers but not over a socket.
func BenchmarkTry(b *testing.B) {
	for _, bc := range []struct {
		name, link string
		edit       func(i int) plan.Edit
	}{
		{"place, one link", "West head..Ormvik/coast", dragPlace},
		{"place, all links", "", dragPlace},
		{"height on top, one link", "West head..Ormvik/coast", dragTop},
		{"height on standoff, one link", "West head..Ormvik/coast", dragStandoff},
		{"antenna, one link", "West head..Ormvik/coast", swapAntenna},
	} {
		b.Run(bc.name, func(b *testing.B) {
			b.ReportAllocs()
			s := serve(b, demo(b))
			get[json.RawMessage](b, s, "/api/links")
			var times []time.Duration
			for i := 0; b.Loop(); i++ {
				body := TryBody{Link: bc.link, Edits: []EditBody{EditBody(bc.edit(i))}}
				begun := time.Now()
				send[json.RawMessage](b, s, http.StatusOK, http.MethodPost, "/api/try", body)
				times = append(times, time.Since(begun))
			}
			slices.Sort(times)
			b.ReportMetric(times[len(times)/2].Seconds()*1e3, "p50-ms")
			b.ReportMetric(times[len(times)*95/100].Seconds()*1e3, "p95-ms")
			runtime.GC()
			var m runtime.MemStats
			runtime.ReadMemStats(&m)
			b.ReportMetric(float64(m.HeapAlloc)/1e6, "heap-MB")
		})
	}
}

func dragPlace(i int) plan.Edit {
	return jsonEdit([]string{"sites", "West head", "at"}, fmt.Sprintf("UTM 27N %d 5262235", 558875+i%4000))
}

func dragTop(i int) plan.Edit {
	return jsonEdit([]string{"sites", "West head", "antenna", "above_ground"}, fmt.Sprintf("%.2f m", 4+float64(i%2000)/100))
}

func dragStandoff(i int) plan.Edit {
	return jsonEdit([]string{"sites", "Ormvik", "stations", "coast", "antenna", "above_ground"}, fmt.Sprintf("%.2f m", 17-float64(i%1200)/100))
}

func swapAntenna(i int) plan.Edit {
	return jsonEdit([]string{"sites", "West head", "antenna", "use"}, []string{"rod", "stick", "pair"}[i%3])
}

func jsonEdit(path []string, value string) plan.Edit {
	text, _ := json.Marshal(value)
	return plan.Edit{Do: plan.SetKey, Path: path, Value: text}
}
