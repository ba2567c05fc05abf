package page

import (
	"testing"
)

// BenchmarkFilter moves a range over a front of 500 designs; ms/filter is what the browser spends until the
// document is changed, ms/frame until it is laid out.
func BenchmarkFilter(b *testing.B) {
	p := open(b, made(500, "Large front"), 1440, 900, false)
	b.ReportAllocs()
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
	text, err := WritePage(made(500, "Large front"))
	if err != nil {
		b.Fatal(err)
	}
	b.ReportMetric(float64(len(text))/1e6, "MB/page")
}
