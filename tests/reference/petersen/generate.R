# sandwich::PetersenCL (Petersen 2009, Rev. Financ. Stud. 22:435-480): 500 firms x 10 years, invented
# by its author for comparing clustered errors; the covariate x takes the place of time.
args <- sub("^--file=", "", grep("^--file=", commandArgs(FALSE), value = TRUE)); source(file.path(dirname(args), "..", "lib", "setup.R"))

data(PetersenCL, package = "sandwich")
write_data(PetersenCL)
write_expected("sandwich::PetersenCL", list(
  analysis_facts("by firm", "data.csv", "firm", "x", "y", wild = NULL, serial_draws = 300),
  analysis_facts("by year", "data.csv", "year", "x", "y", serial_draws = 300)
))
