# The wild cluster bootstrap-t with the null imposed, by refitting every draw with lm.fit: no short
# forms. Weights are a matrix with one row per subject and one column per draw.

all_signs <- function(G) t(as.matrix(expand.grid(rep(list(c(1, -1)), G))))
webb_points <- c(-sqrt(3 / 2), -1, -sqrt(1 / 2), sqrt(1 / 2), 1, sqrt(3 / 2))
all_webb <- function(G) t(as.matrix(expand.grid(rep(list(webb_points), G))))
random_signs <- function(G, B) matrix(sample(c(1, -1), G * B, TRUE), G)
random_webb <- function(G, B) matrix(sample(webb_points, G * B, TRUE), G)

# t of coefficient k with the CR1 error, for each column of Y.
cr1_t <- function(X, Y, subject, k, value) {
  fit <- lm.fit(X, Y)
  E <- as.matrix(fit$residuals)
  B <- as.matrix(fit$coefficients)
  G <- length(unique(subject))
  row <- solve(crossprod(X))[k, ]
  lever <- drop(X %*% row)
  scores <- rowsum(lever * E, subject)
  (B[k, ] - value) / sqrt(G / (G - 1) * colSums(scores^2))
}

wild_p <- function(X, y, subject, k, W, value = 0) {
  t0 <- cr1_t(X, y, subject, k, value)
  restricted <- lm.fit(X[, -k, drop = FALSE], y - value * X[, k])
  base <- restricted$fitted.values + value * X[, k]
  draws <- base + restricted$residuals * W[subject, ]
  t <- cr1_t(X, draws, subject, k, value)
  # 0/0 is no evidence and does not count; a distance without spread does.
  mean(!is.nan(t) & abs(t) >= abs(t0) * (1 - 1e-9))
}

# Ends of {b : p(b) > .05}: outwards in steps of se/4 until p <= .05 eight times running, then
# bisection of the last crossing. NA when no end is met within 200 steps.
wild_interval <- function(X, y, subject, k, W) {
  estimate <- lm.fit(X, y)$coefficients[[k]]
  se <- abs(estimate / cr1_t(X, y, subject, k, 0))
  inside <- function(b) wild_p(X, y, subject, k, W, b) > 0.05
  end <- function(sign) {
    last <- estimate; run <- 0
    for (step in 1:200) {
      b <- estimate + sign * step * se / 4
      if (inside(b)) { last <- b; run <- 0 } else run <- run + 1
      if (run == 8) break
    }
    if (run < 8) return(NA)
    from <- last; to <- last + sign * se / 4
    while (abs(to - from) > 1e-9 * se) {
      middle <- (from + to) / 2
      if (inside(middle)) from <- middle else to <- middle
    }
    (from + to) / 2
  }
  list(lower = end(-1), upper = end(1))
}

wild_facts <- function(d, B = 1999, interval = FALSE, mc = 20000) {
  X <- unname(model.matrix(ordinary_fit(d)))
  subject <- as.integer(d$subject); G <- max(subject)
  keys <- coefficient_names(d)
  kind <- if (2^G <= B) "rademacher_enumerated" else if (G < 12) "webb" else "rademacher"
  W <- switch(kind,
    rademacher_enumerated = all_signs(G), webb = random_webb(G, mc), rademacher = random_signs(G, mc)
  )
  one <- function(k) {
    f <- list(
      t = cr1_t(X, d$y, subject, k, 0), p = wild_p(X, d$y, subject, k, W), weights = kind,
      draws = ncol(W), exact = kind == "rademacher_enumerated"
    )
    if (f$exact && G <= 5) f$webb_p <- wild_p(X, d$y, subject, k, all_webb(G))
    if (interval) f <- c(f, wild_interval(X, d$y, subject, k, W))
    f
  }
  setNames(lapply(seq_along(keys)[-1], one), keys[-1])
}
