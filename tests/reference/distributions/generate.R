# Tail areas and quantiles of R over a grid that reaches far into the tails. R's own quantiles are
# polished by Newton steps on R's tail areas, so that each is right to the last few digits.
local({
  here <- sub("^--file=", "", grep("^--file=", commandArgs(FALSE), value = TRUE))
  setwd(dirname(normalizePath(here)))
})

num <- function(x) sprintf("%.17g", x)
table_of <- function(name, args, values) {
  ok <- is.finite(values) & (abs(values) > 1e-300 | values == 0)
  rows <- apply(cbind(args, values)[ok, , drop = FALSE], 1, function(r) paste0("[", paste(num(r), collapse = ","), "]"))
  paste0("\"", name, "\": [\n", paste(rows, collapse = ",\n"), "\n]")
}
# Newton on log tail areas, on the smaller side; start is R's quantile.
polish <- function(q, p, lower, upper, density) {
  for (k in seq_along(q)) for (i in 1:4) {
    step <- if (p[k] < 0.5) {
      (lower(q[k], k) - p[k]) / density(q[k], k)
    } else {
      -(upper(q[k], k) - (1 - p[k])) / density(q[k], k)
    }
    if (!is.finite(step)) break
    q[k] <- q[k] - step
  }
  q
}

z <- c(-38, -30, -20, -12, -8, -5, -3, -1.959963984540054, -1, -0.3, -1e-3, -1e-8, 0, 1e-8, 1e-3, 0.3, 0.6744897501960817, 1, 1.959963984540054, 3, 5, 6.5, 8, 12, 20, 30, 37)
p <- c(1e-200, 1e-100, 1e-50, 1e-20, 1e-12, 1e-8, 1e-5, 1e-3, 0.01, 0.025, 0.05, 0.1, 0.25, 0.4, 0.499, 0.5, 0.6, 0.75, 0.9, 0.95, 0.975, 0.99, 0.999, 0.99999, 1 - 1e-8)

t <- c(0, 1e-6, 0.1, 0.5, 1, 2, 3, 4.3, 6, 10, 20, 50, 200, 1000, 1e5)
df <- c(0.5, 1, 1.7, 2, 2.828165, 4, 5, 7.5, 10, 15.5549, 17, 29, 30, 60, 139.2, 308.76, 1000, 4998, 49998, 1e6)
tg <- expand.grid(x = t, df = df)
pt_grid <- expand.grid(p = p[p >= 1e-50], df = df)

chi <- expand.grid(x = c(1e-8, 1e-3, 0.1, 0.5, 1, 2, 3.841458820694124, 7, 15, 40, 107.198577, 300, 800, 1300), df = c(1, 2, 3, 4.5, 7, 12, 50, 200, 1000))
chi_q <- expand.grid(p = c(1e-10, p[p >= 1e-5]), df = c(1, 2, 3, 4.5, 7, 12, 50, 200, 1000))

d1 <- c(1, 2, 3.5, 4, 9, 17, 26, 499, 4999)
d2 <- c(1, 2.5, 4, 10, 14.44658, 20, 81, 162, 4500, 45000)
fx <- expand.grid(x = c(1e-6, 0.01, 0.2, 0.68, 1, 1.2, 1.6, 2.5, 4, 8, 15.4, 63, 500, 1e4), d1 = d1, d2 = d2)
f_q <- expand.grid(p = c(1e-6, 1e-3, 0.01, 0.025, 0.05, 0.3, 0.5, 0.8, 0.95, 0.975, 0.99, 0.999, 0.99999), d1 = d1, d2 = d2)

tables <- c(
  table_of("normalLower", cbind(z), pnorm(z)),
  table_of("normalUpper", cbind(z), pnorm(z, lower.tail = FALSE)),
  table_of("normalQuantile", cbind(p), polish(qnorm(p), p, function(q, k) pnorm(q), function(q, k) pnorm(q, lower.tail = FALSE), function(q, k) dnorm(q))),
  table_of("studentTwoSided", tg, 2 * pt(tg$x, tg$df, lower.tail = FALSE)),
  table_of("studentUpper", rbind(tg, transform(tg, x = -x)), pt(c(tg$x, -tg$x), c(tg$df, tg$df), lower.tail = FALSE)),
  table_of("studentQuantile", pt_grid, polish(qt(pt_grid$p, pt_grid$df), pt_grid$p,
    function(q, k) pt(q, pt_grid$df[k]), function(q, k) pt(q, pt_grid$df[k], lower.tail = FALSE), function(q, k) dt(q, pt_grid$df[k]))),
  table_of("chiSquaredUpper", chi, pchisq(chi$x, chi$df, lower.tail = FALSE)),
  table_of("chiSquaredQuantile", chi_q, polish(qchisq(chi_q$p, chi_q$df), chi_q$p,
    function(q, k) pchisq(q, chi_q$df[k]), function(q, k) pchisq(q, chi_q$df[k], lower.tail = FALSE), function(q, k) dchisq(q, chi_q$df[k]))),
  table_of("fUpper", fx, pf(fx$x, fx$d1, fx$d2, lower.tail = FALSE)),
  table_of("fQuantile", f_q, polish(qf(f_q$p, f_q$d1, f_q$d2), f_q$p,
    function(q, k) pf(q, f_q$d1[k], f_q$d2[k]), function(q, k) pf(q, f_q$d1[k], f_q$d2[k], lower.tail = FALSE), function(q, k) df(q, f_q$d1[k], f_q$d2[k])))
)
writeLines(paste0("{\n", paste(tables, collapse = ",\n"), "\n}"), "expected.json")
writeLines(R.version.string, "versions.txt")
