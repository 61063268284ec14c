# The pooled line: ordinary errors and the cluster-robust ones of clubSandwich (and sandwich beside).

ols_facts <- function(d) {
  fit <- ordinary_fit(d)
  s <- summary(fit)
  limits <- confint(fit)
  keys <- coefficient_names(d)
  table <- lapply(seq_along(keys), function(k) list(
    estimate = s$coefficients[k, 1], se = s$coefficients[k, 2], t = s$coefficients[k, 3],
    df = fit$df.residual, p = s$coefficients[k, 4], lower = limits[k, 1], upper = limits[k, 2]
  ))
  list(coefficients = setNames(table, keys), sigma = s$sigma, r_squared = s$r.squared)
}

pooled_facts <- function(d) {
  fit <- ordinary_fit(d)
  keys <- coefficient_names(d)
  errors <- lapply(
    setNames(nm = c("CR0", "CR1", "CR1S", "CR2", "CR3")),
    function(type) sqrt(diag(vcovCR(fit, cluster = d$subject, type = type)))
  )
  # A second opinion on the one that two packages share.
  beside <- sqrt(diag(vcovCL(fit, cluster = d$subject, type = "HC1", cadjust = TRUE)))
  stopifnot(max(abs(beside / errors$CR1S - 1)) < 1e-9)
  tests <- coef_test(fit, vcov = "CR2", cluster = d$subject, test = "Satterthwaite")
  half <- qt(0.975, tests$df_Satt) * tests$SE
  table <- lapply(seq_along(keys), function(k) list(
    estimate = tests$beta[k],
    se_cr0 = errors$CR0[[k]], se_cr1 = errors$CR1[[k]], se_cr1s = errors$CR1S[[k]],
    se_cr2 = errors$CR2[[k]], se_cr3 = errors$CR3[[k]],
    df = tests$df_Satt[k], t = tests$tstat[k], p = tests$p_Satt[k],
    lower = tests$beta[k] - half[k], upper = tests$beta[k] + half[k]
  ))
  result <- list(coefficients = setNames(table, keys))
  if (!is.null(d$group) && nlevels(d$group) > 2) {
    C <- diag(length(keys))[startsWith(keys, "time_by_group:"), , drop = FALSE]
    w <- Wald_test(fit, constraints = C, vcov = "CR2", cluster = d$subject, test = "HTZ")
    result$group_test <- list(f = w$Fstat, df1 = w$df_num, df2 = w$df_denom, p = w$p_val)
  }
  result
}

se_ratio_facts <- function(d) {
  fit <- ordinary_fit(d)
  robust <- sqrt(diag(vcovCR(fit, cluster = d$subject, type = "CR2")))
  named(robust / sqrt(diag(vcov(fit))), coefficient_names(d))
}

# Moulton (1986) from its meaning, not from a short form: the variance of the ordinary estimate when
# the errors have correlation rho within subject and none between, over the ordinary variance.
moulton_facts <- function(d, rho) {
  X <- model.matrix(ordinary_fit(d))
  bread <- solve(crossprod(scale_columns(X)))
  Z <- scale_columns(X)
  totals <- rowsum(Z, as.integer(d$subject))
  meat <- (1 - rho) * crossprod(Z) + rho * crossprod(totals)
  named(sqrt(diag(bread %*% meat %*% bread) / diag(bread)), coefficient_names(d))
}

# Ratios of errors do not depend on the length of a column; this keeps solve() well conditioned.
scale_columns <- function(X) sweep(X, 2, sqrt(colSums(X^2)), "/")

# The drawn line with its band: at time t the value of the line is the intercept once time is counted from
# t, and the level's own line is the reference once that level comes first.
band_facts <- function(d) {
  levels_of <- if (is.null(d$group)) list(NULL) else as.list(levels(d$group))
  times <- unname(c(min(d$time), quantile(d$time, c(0.3, 0.5)), max(d$time) + 1))
  points <- list()
  for (level in levels_of) for (t in times) {
    moved <- transform(d, time = time - t)
    if (!is.null(level)) moved$group <- relevel(d$group, ref = level)
    test <- coef_test(ordinary_fit(moved), vcov = "CR2", cluster = moved$subject, test = "Satterthwaite")[1, ]
    half <- qt(0.975, test$df_Satt) * test$SE
    point <- list(
      time = t, estimate = test$beta, lower = test$beta - half, upper = test$beta + half, df = test$df_Satt
    )
    if (!is.null(level)) point$group <- level
    points[[length(points) + 1]] <- point
  }
  points
}
