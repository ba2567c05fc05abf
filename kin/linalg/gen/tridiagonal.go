package main

import "fmt"

const order = 6

// gram writes the function of that name.
func gram(w *writer) {
	w.line("// gram writes the lower triangle of J Jᵀ into g, row-major.")
	w.line("func gram(j, g *[36]float64) {")
	for p := range order {
		for q := range p + 1 {
			w.line("g[%d] = %s", order*p+q, dot(
				names(order*p, order*p+order, "j[%d]"),
				names(order*q, order*q+order, "j[%d]")))
		}
	}
	w.line("}\n")
}

// element names an element of the matrix in work, kept as a lower triangle.
func element(i, k int) string { return fmt.Sprintf("g%d%d", max(i, k), min(i, k)) }

// tridiagonalise writes the function of that name: three Householder
// reflections, and for the last column, of two elements, a rotation that needs
// no root because only squares of the outcome are wanted.
func tridiagonalise(w *writer) {
	w.line("// tridiagonalise sets t to a tridiagonal matrix similar to the symmetric matrix")
	w.line("// whose lower triangle is g, by Householder reflections. An undefined outcome,")
	w.line("// NaN, is left to the caller.")
	w.line("func tridiagonalise(g *[36]float64, t *tridiagonal) {")
	w.line("var s, is, sigma, isigma, beta, a, m, h float64")
	var diagonal []string
	for i := range order {
		for k := range i + 1 {
			w.line("%s := g[%d]", element(i, k), order*i+k)
		}
		diagonal = append(diagonal, element(i, i))
	}
	w.line("t.trace = %s", sum(diagonal))
	w.line("t.d[0] = g00")
	w.line("g10 += tiny")
	for k := range order - 3 {
		reflect(w, k)
	}
	w.line("s = %s", dot([]string{"g43", "g53"}, []string{"g43", "g53"}))
	w.line("is = 1 / s")
	w.line("t.e[3] = s")
	w.line("a = %s", product("is", "("+sum([]string{"float64(g43*g43*g44)", "float64(2*g43*g53*g54)", "float64(g53*g53*g55)"})+")"))
	w.line("t.d[4] = a")
	w.line("t.d[5] = g44 + g55 - a")
	w.line("m = is * (float64((g43+g53)*(g43-g53)*g54) + float64(g43*g53*(g55-g44)))")
	w.line("t.e[4] = m*m")
	w.line("}")
}

// reflect writes one reflection H = I - beta v vᵀ, v = x + sigma e₁, which takes
// the column x below the diagonal element k to -sigma e₁ and the block B beside
// it to H B H (Golub and Van Loan 2013, Matrix Computations, section 8.3.1).
//
// The textbook forms B v. Here r = B x is formed while the root and the
// reciprocals are under way, and the first column of H B H, which is
// -H r/sigma, before the rest: both shorten the chain to the next root.
func reflect(w *writer, k int) {
	lo := k + 1
	n := order - lo
	var x, r []string
	for i := range n {
		x = append(x, element(lo+i, k))
		r = append(r, fmt.Sprintf("r%d%d", lo+i, k))
	}
	w.line("\ns = %s", dot(x, x))
	w.line("t.e[%d] = s", k)
	w.line("sigma = withSign(1, %s) * math.Sqrt(s)", x[0])
	w.line("beta = 1 / (s + %s)", product("sigma", x[0]))
	w.line("is = 1 / s")
	w.line("isigma = -sigma * is")
	for i := range n {
		var b []string
		for m := range n {
			b = append(b, element(lo+i, lo+m))
		}
		w.line("%s := %s", r[i], dot(b, x))
	}
	w.line("a = %s", dot(x, r))
	w.line("t.d[%d] = a * is", lo)
	w.line("m = isigma * beta * (a + %s)", product("sigma", r[0]))
	w.line("h = beta * (0.5 * (a + float64(sigma*(float64(2*%s)+%s)))) * beta", r[0], product("sigma", element(lo, lo)))
	for i := 1; i < n; i++ {
		w.line("w%d%d := %s - %s", lo+i, k, product("beta", "("+r[i]+" + "+product("sigma", element(lo+i, lo))+")"), product("h", x[i]))
	}
	for i := 1; i < n; i++ {
		first := product(r[i], "isigma")
		if i == 1 {
			first += " + tiny"
		}
		w.line("%s = %s - %s", element(lo+i, lo), first, product("m", x[i]))
	}
	for i := 1; i < n; i++ {
		wi := fmt.Sprintf("w%d%d", lo+i, k)
		for m := 1; m < i; m++ {
			w.line("%s -= %s + %s", element(lo+i, lo+m), product(x[i], fmt.Sprintf("w%d%d", lo+m, k)), product(wi, x[m]))
		}
		w.line("%s -= %s", element(lo+i, lo+i), product("2*"+x[i], wi))
	}
}
