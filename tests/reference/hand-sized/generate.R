# Twelve readings of five subjects, small enough to follow by hand; the table is our own.
args <- sub("^--file=", "", grep("^--file=", commandArgs(FALSE), value = TRUE)); source(file.path(dirname(args), "..", "lib", "setup.R"))

d <- data.frame(
  id = c(1, 1, 1, 2, 2, 3, 3, 3, 3, 4, 4, 5),
  x = c(0, 1, 2, 0, 2, 0, 1, 2, 3, 1, 3, 2),
  y = c(10, 12, 13, 8, 11, 15, 15, 17, 20, 9, 12, 14)
)
write_data(d)
write_expected("our own table", list(analysis_facts("twelve readings", "data.csv", "id", "x", "y")))
