# Tables in which one subject nearly holds the slope alone: everybody else stands at time 0 but for one
# reading a little off. The nearer it is, the closer an eigenvalue of that subject's H_ii is to 1.
args <- sub("^--file=", "", grep("^--file=", commandArgs(FALSE), value = TRUE)); source(file.path(dirname(args), "..", "lib", "setup.R"))

y <- c(3, 4.5, 5, 6, 4, 5.25, 6, 7, 2, 3, 7, 8.125)
of <- function(step) {
  file <- sprintf("step-%s.csv", format(step, scientific = FALSE))
  d <- data.frame(
    subject = c(rep(paste0("s", 1:6), each = 2), "far", "far"),
    time = c(step, rep(0, 11), 10, 10), y = c(y, 30, 33)
  )
  write_data(d, file)
  d <- long_table(file, "subject", "time", "y")
  list(
    name = paste("step", step), data = file,
    columns = list(subject = "subject", time = "time", response = "y"), pooled = pooled_facts(d)
  )
}
write_expected("our own table", lapply(c(1, 0.1, 0.01, 0.001), of))
