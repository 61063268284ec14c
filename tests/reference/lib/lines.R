# Each subject's own line by lm on that subject alone, and the t interval of the mean slope.

line_facts <- function(d) {
  lines <- list(); skipped <- character()
  for (s in levels(d$subject)) {
    own <- d[d$subject == s, ]
    if (length(unique(own$time)) < 2) { skipped <- c(skipped, s); next }
    fit <- lm(y ~ time, data = own)
    line <- list(subject = s, n = nrow(own), intercept = coef(fit)[[1]], slope = coef(fit)[[2]])
    line["slope_se"] <- list(if (nrow(own) >= 3) suppressWarnings(summary(fit)$coefficients[2, 2]))
    lines[[length(lines) + 1]] <- line
  }
  slopes <- vapply(lines, function(l) l$slope, 0)
  limits <- if (length(slopes) > 1) t.test(slopes)$conf.int else c(NA, NA)
  list(
    lines = lines, not_fitted = I(skipped), mean_slope = mean(slopes), sd_slope = sd(slopes),
    mean_slope_lower = limits[1], mean_slope_upper = limits[2]
  )
}
