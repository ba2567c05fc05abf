package page

import (
	"testing"

	"legwright/cmd/legwright/internal/sheet"
)

// BenchmarkFilter moves a range over a front of 500 designs; ms/filter is what the browser spends until the
// document is changed, ms/frame until it is laid out.
func BenchmarkFilter(b *testing.B) { benchFilter(b, made(500, "Large front"), false) }

// BenchmarkFilterListed does so with every row of the table listed, over designs of three families whose
// dimensions differ.
func BenchmarkFilterListed(b *testing.B) { benchFilter(b, threeFamilies(500), true) }

// threeFamilies is a front whose families have dimensions of their own: a wide table.
func threeFamilies(n int) *sheet.Data {
	d := made(n, "Three families")
	third := madeFamily("6-YPS")
	d.Families = append(d.Families, third)
	for k := range d.Families {
		f := &d.Families[k]
		for i := range f.Dimensions {
			if k > 0 && i != 2 {
				f.Dimensions[i].Name += []string{"", "_upper", "_lower"}[k]
			}
		}
	}
	for i := range d.Designs {
		d.Designs[i].Family = i % 3
	}
	return d
}

func benchFilter(b *testing.B, d *sheet.Data, list bool) {
	p := open(b, d, 1440, 900, false)
	b.ReportAllocs()
	if list {
		eval[bool](p, `[...document.querySelectorAll("#ranked button")].find((b) => b.textContent === "list all").click(), true`)
	}
	got := eval[[]float64](p, `(async () => {
		const {store, model} = legwright, a = model.axes[1];
		let spent = 0, laid = 0;
		const n = 60;
		for (let k = 0; k < n; k++) {
			const t = performance.now();
			store.setRange(a.key, [a.low, a.low + (a.high - a.low) * (0.2 + 0.8 * Math.abs(Math.sin(k)))]);
			spent += performance.now() - t;
			document.body.offsetHeight;
			laid += performance.now() - t;
			await new Promise(requestAnimationFrame);
		}
		return [spent / n, laid / n];
	})()`, awaited)
	b.ReportMetric(got[0], "ms/filter")
	b.ReportMetric(got[1], "ms/frame")
	text, err := WritePage(d)
	if err != nil {
		b.Fatal(err)
	}
	b.ReportMetric(float64(len(text))/1e6, "MB/page")
}
