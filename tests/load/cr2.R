# Rscript cr2.R FILE REPEATS: R's own time, inside the process, for what a careful analyst would run:
# lm and the cluster-robust covariance of sandwich (HC1), the file being read already.
suppressMessages({ library(sandwich); library(jsonlite) })
args <- commandArgs(TRUE)
d <- read.csv(args[1])
once <- function() {
  t0 <- Sys.time()
  fit <- lm(y ~ time, data = d)
  v <- vcovCL(fit, cluster = d$subject, type = "HC1")
  took <- as.numeric(difftime(Sys.time(), t0, units = "secs")) * 1000
  list(ms = took, slope = coef(fit)[[2]], se = sqrt(v[2, 2]))
}
first <- once()
more <- vapply(seq_len(as.integer(args[2])), function(i) once()$ms, 0)
cat(toJSON(list(first = first$ms, repeated = median(more), slope = first$slope, se = first$se), auto_unbox = TRUE, digits = I(15)))
