# The long table, its model matrix and the ordinary fit, as every reference file uses them.

suppressMessages({
  library(jsonlite)
  library(sandwich)
  library(clubSandwich)
  library(lme4)
  library(nlme)
})

# Complete rows of the named columns; subjects in order of first appearance, readings by time
# within subject, equal times in file order.
long_table <- function(file, subject, time, response, group = NULL) {
  raw <- read.csv(file, colClasses = "character", check.names = FALSE)
  d <- data.frame(
    subject = raw[[subject]],
    time = as.numeric(raw[[time]]),
    y = as.numeric(raw[[response]])
  )
  if (!is.null(group)) {
    # Reference level: the first in plain code-unit order, whatever the locale.
    d$group <- factor(raw[[group]], levels = sort(unique(raw[[group]]), method = "radix"))
  }
  d <- d[complete.cases(d), ]
  d$subject <- factor(d$subject, levels = unique(d$subject))
  d[order(as.integer(d$subject), d$time, seq_len(nrow(d))), ]
}

# The names that the result gives to the coefficients, in the order of R's model matrix.
coefficient_names <- function(d) {
  if (is.null(d$group)) return(c("intercept", "time"))
  others <- levels(d$group)[-1]
  if (length(others) == 1) return(c("intercept", "time", "group", "time_by_group"))
  c("intercept", "time", paste0("group:", others), paste0("time_by_group:", others))
}

ordinary_fit <- function(d) {
  if (is.null(d$group)) lm(y ~ time, data = d) else lm(y ~ time * group, data = d)
}

named <- function(values, names) setNames(as.list(unname(values)), names)
