# Time split into the subject's mean and the deviation from it (Neuhaus & Kalbfleisch 1998), tested with CR2
# in one fit. Between minus within is the coefficient of the mean beside time itself: the same fit, other
# columns. Where all means agree there is a within part only.
within_between_facts <- function(d) {
  d$mean <- ave(d$time, d$subject)
  d$deviation <- d$time - d$mean
  one <- function(fit, column) {
    tests <- coef_test(fit, vcov = "CR2", cluster = d$subject, test = "Satterthwaite")
    k <- match(column, names(coef(fit)))
    list(estimate = tests$beta[k], se_cr2 = tests$SE[k], df = tests$df_Satt[k], p = tests$p_Satt[k])
  }
  if (diff(range(d$mean)) <= 1e-9 * diff(range(d$time))) {
    # Three entries, two of them NULL: list(NULL) keeps the names.
    return(c(list(within = one(lm(y ~ deviation, data = d), "deviation")), list(between = NULL, difference = NULL)))
  }
  fit <- lm(y ~ deviation + mean, data = d)
  list(
    within = one(fit, "deviation"), between = one(fit, "mean"),
    difference = one(lm(y ~ time + mean, data = d), "mean")
  )
}
