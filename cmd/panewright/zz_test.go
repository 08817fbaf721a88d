package main

import (
	"bytes"
	"fmt"
	"panewright/cmd/panewright/internal/table"
	"panewright/glazing"
	"panewright/glazing/project"
	"testing"
	"time"
)

func TestZ(t *testing.T) {
	p0 := time.Now()
	p, err := project.Load("/tmp/panewright-demo/project.yaml", project.Access{})
	if err != nil {
		t.Fatal(err)
	}
	p1 := time.Now()
	m := p.Method(glazing.EN)
	p2 := time.Now()
	rs, _ := p.RateBy(m, p.Makeups[0])
	p3 := time.Now()
	r := table.Report{Version: "x", Project: p, Figures: glazing.Figures(), Ratings: rs}
	p4 := time.Now()
	table.Schedule(r)
	p5 := time.Now()
	table.JSON(r)
	p6 := time.Now()
	fmt.Println("load", p1.Sub(p0), "method", p2.Sub(p1), "rate", p3.Sub(p2), "fig", p4.Sub(p3), "sched", p5.Sub(p4), "json", p6.Sub(p5))
	var b bytes.Buffer
	q := time.Now()
	run([]string{"--version"}, streams{out: &b, err: &b})
	fmt.Println("version", time.Since(q))
	q = time.Now()
	run([]string{"rate", "/tmp/panewright-demo/project.yaml", "--makeup", "D1"}, streams{out: &b, err: &b})
	fmt.Println("rate", time.Since(q))
}
func BenchmarkLoad(b *testing.B) {
	for b.Loop() {
		project.Load("/tmp/panewright-demo/project.yaml", project.Access{})
	}
}
func BenchmarkRun(b *testing.B) {
	for b.Loop() {
		var o bytes.Buffer
		run([]string{"rate", "/tmp/panewright-demo/project.yaml", "--makeup", "D1"}, streams{out: &o, err: &o})
	}
}
