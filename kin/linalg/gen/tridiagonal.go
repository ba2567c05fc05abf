package main

import "fmt"

// order of the matrices.
const order = 6

// gram names an element of the symmetric matrix J Jᵀ, kept as a lower triangle.
func gram(i, j int) string { return fmt.Sprintf("g%d%d", max(i, j), min(i, j)) }

// row returns the six elements of row i of the array a.
func row(a string, i int) []string {
	return names(order*i, order*i+order, a+"[%d]")
}

// tridiagonalise writes the function of that name: Gram matrix and four
// Householder reflections (Wilkinson 1965, chapter 5; Golub and Van Loan 2013,
// algorithm 8.3.1).
func tridiagonalise(w *writer) {
	w.comment(`tridiagonalise sets t to a tridiagonal matrix similar to J Jᵀ.
		No branch: 1e-300 keeps a vanished column from dividing by zero.`)
	w.line("func tridiagonalise(j *[36]float64, t *tridiagonal) {")
	w.line("var s, norm, beta, half float64")
	for p := range order {
		for q := range p + 1 {
			w.line("%s := %s", gram(p, q), dot(row("j", p), row("j", q)))
		}
	}
	var diag []string
	for k := range order {
		diag = append(diag, gram(k, k))
	}
	w.line("t.trace = %s", sum(diag))
	for k := range order - 2 {
		reflect(w, k)
	}
	w.line("t.d[4], t.d[5] = g44, g55")
	w.line("t.e[4] = g54 * g54")
	w.line("}")
}

// reflect writes one reflection I - beta v vᵀ: it annihilates column k below
// the subdiagonal and changes the trailing block to B - v wᵀ - w vᵀ.
func reflect(w *writer, k int) {
	lo := k + 1
	v := []string{fmt.Sprintf("v%d", lo)} // elements of v; the rest stand in column k
	var column, p []string
	for i := lo; i < order; i++ {
		column = append(column, gram(i, k))
		p = append(p, fmt.Sprintf("w%d%d", k, i))
		if i > lo {
			v = append(v, gram(i, k))
		}
	}
	w.line("t.d[%d] = %s", k, gram(k, k))
	w.line("s = 1e-300 + (%s)", dot(column, column))
	w.line("t.e[%d] = s", k)
	w.line("norm = withSign(math.Sqrt(s), %s)", column[0])
	w.line("%s := %s + norm", v[0], column[0])
	w.line("beta = 1 / (norm * %s)", v[0])
	for i := range p {
		var r []string
		for j := range v {
			r = append(r, gram(lo+i, lo+j))
		}
		w.line("%s := %s", p[i], dot(r, v))
	}
	w.line("half = 0.5 * beta * (beta * (%s))", dot(p, v))
	for i := range p {
		w.line("%s = %s - %s", p[i], product("beta", p[i]), product("half", v[i]))
	}
	for i := range p {
		w.line("%s -= %s", gram(lo+i, lo+i), product("2*"+v[i], p[i]))
		for j := range i {
			w.line("%s -= %s + %s", gram(lo+i, lo+j), product(v[i], p[j]), product(p[i], v[j]))
		}
	}
}
