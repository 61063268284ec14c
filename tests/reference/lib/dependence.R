# Amount and type of dependence, from the definitions: one-way ANOVA by R's own aov tables, interval
# by qf, likelihood ratio by lme4 with nlme beside, the rest by plain loops over pairs.

structure_facts <- function(d) {
  n <- as.integer(table(d$subject))
  distinct <- tapply(d$time, d$subject, function(t) length(unique(t)))
  list(
    subjects = length(n), readings = nrow(d), subjects_with_repeats = sum(n >= 2),
    repeats = list(min = min(n), median = median(n), max = max(n)),
    distinct_times = length(unique(d$time)), replicates = sum(n - distinct),
    share_following = (nrow(d) - length(n)) / nrow(d)
  )
}

anova_of <- function(v, subject) {
  table <- anova(lm(v ~ subject))
  n <- as.integer(table(subject))
  list(
    msb = table[1, "Mean Sq"], msw = table[2, "Mean Sq"],
    n0 = (sum(n) - sum(n^2) / sum(n)) / (length(n) - 1),
    df1 = table[1, "Df"], df2 = table[2, "Df"]
  )
}

icc_of <- function(a) {
  f <- a$msb / a$msw
  limit <- function(f) (f - 1) / (f + a$n0 - 1)
  list(
    estimate = (a$msb - a$msw) / (a$msb + (a$n0 - 1) * a$msw),
    lower = limit(f / qf(0.975, a$df1, a$df2)), upper = limit(f * qf(0.975, a$df2, a$df1))
  )
}

lr_facts <- function(d) {
  fit <- ordinary_fit(d)
  mixed <- suppressMessages(lmer(
    update(formula(fit), . ~ . + (1 | subject)), data = d, REML = TRUE,
    control = lmerControl(optimizer = "bobyqa", optCtrl = list(rhoend = 1e-12, maxfun = 1e5))
  ))
  l0 <- as.numeric(logLik(fit, REML = TRUE))
  l1 <- as.numeric(logLik(mixed))
  beside <- lme(formula(fit), random = ~ 1 | subject, data = d, method = "REML")
  stopifnot(abs(as.numeric(logLik(beside)) - l1) < 1e-4)
  lr <- max(0, 2 * (l1 - l0))
  if (lr < 1e-6) lr <- 0
  sds <- as.data.frame(VarCorr(mixed))$sdcor
  list(
    loglik_none = l0, loglik_random_intercept = l1, sd_intercept = sds[1], sd_residual = sds[2],
    lr = lr, p = if (lr == 0) 1 else pchisq(lr, 1, lower.tail = FALSE) / 2
  )
}

lag1_of <- function(e, subject) {
  above <- 0; below <- 0; offset <- 0
  for (v in split(e, subject)) {
    n <- length(v)
    if (n < 2) next
    dev <- v - mean(v); s <- sum(dev^2)
    above <- above + sum(dev[-n] * dev[-1])
    below <- below + s * (n - 1) / n
    offset <- offset + s / n
  }
  list(lag1 = above / below, lag1_expected = -offset / below)
}

variogram_facts <- function(d, e) {
  lags <- values <- list()
  for (rows in split(seq_len(nrow(d)), d$subject)) {
    if (length(rows) < 2) next
    pairs <- combn(rows, 2)
    lags[[length(lags) + 1]] <- abs(d$time[pairs[1, ]] - d$time[pairs[2, ]])
    values[[length(values) + 1]] <- (e[pairs[1, ]] - e[pairs[2, ]])^2 / 2
  }
  lag <- unlist(lags); value <- unlist(values)
  distinct <- sort(unique(lag))
  bin <- if (length(distinct) <= 15) match(lag, distinct) else
    # An edge belongs to the lower bin: count the edges strictly below the lag.
    findInterval(lag, quantile(lag, (1:11) / 12, type = 7), left.open = TRUE)
  bins <- lapply(sort(unique(bin)), function(b) list(
    lag = mean(lag[bin == b]), value = mean(value[bin == b]), pairs = sum(bin == b)
  ))
  total <- 0; count <- 0
  rows_of <- split(seq_len(nrow(d)), d$subject)
  for (rows in rows_of) {
    others <- e[-rows]
    for (r in rows) total <- total + sum((e[r] - others)^2) / 2
    count <- count + length(rows) * length(others)
  }
  list(bins = bins, total = total / count)
}

# p values that rest on random draws: R's own draws and the Monte Carlo error of this p.
dealt_p <- function(d, e, draws = 20000) {
  n <- as.integer(table(d$subject))
  g <- as.integer(d$subject)
  score <- function(v) sum(rowsum(v, g)^2 / n)
  observed <- score(e)
  hits <- sum(replicate(draws, score(sample(e)) >= observed * (1 - 1e-12)))
  p <- (1 + hits) / (draws + 1)
  list(p = p, draws = draws)
}

serial_p <- function(d, e, draws = 5000) {
  rows <- split(seq_along(e), d$subject)
  observed <- lag1_of(e, d$subject)$lag1
  hits <- 0
  for (b in seq_len(draws)) {
    for (r in rows) if (length(r) > 1) e[r] <- e[r[sample.int(length(r))]]
    hits <- hits + (lag1_of(e, d$subject)$lag1 >= observed - 1e-12 * abs(observed))
  }
  list(p = (1 + hits) / (draws + 1), draws = draws)
}

dependence_facts <- function(d, serial_draws = 5000) {
  e <- unname(resid(ordinary_fit(d)))
  a <- anova_of(e, d$subject)
  icc <- icc_of(a)
  n <- as.integer(table(d$subject))
  effect <- 1 + (sum(n^2) / sum(n) - 1) * icc$estimate
  serial <- lag1_of(e, d$subject)
  serial$permutation <- serial_p(d, e, serial_draws)
  list(
    icc_residual = icc, icc_response = icc_of(anova_of(d$y, d$subject)),
    anova = a[c("msb", "msw", "n0")], design_effect = effect, effective_n = nrow(d) / effect,
    lr_test = lr_facts(d), permutation = c(list(statistic = a$msb / a$msw), dealt_p(d, e)),
    serial = serial, variogram = variogram_facts(d, e),
    se_ratio = se_ratio_facts(d), moulton = moulton_facts(d, icc$estimate)
  )
}
