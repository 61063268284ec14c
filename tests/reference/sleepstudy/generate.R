# lme4::sleepstudy (Belenky et al. 2003, J. Sleep Res. 12:1-12): reaction time by days of restricted
# sleep, 18 subjects x 10 days; whole, with rows dropped, and two sets small enough to enumerate.
args <- sub("^--file=", "", grep("^--file=", commandArgs(FALSE), value = TRUE)); source(file.path(dirname(args), "..", "lib", "setup.R"))

data(sleepstudy)
d <- sleepstudy[c("Subject", "Days", "Reaction")]
write_data(d)
write_data(d[-c(5:10, 25:30, 48:50, 77, 100:109), ], "unbalanced.csv")
first <- unique(d$Subject)[1:8]
write_data(d[d$Subject %in% first, ], "first-eight.csv")
write_data(d[d$Subject %in% c("309", "310", "330", "331", "334", "335"), ], "six.csv")

of <- function(name, file, ...) analysis_facts(name, file, "Subject", "Days", "Reaction", ...)
write_expected("lme4::sleepstudy", list(
  of("full", "data.csv"),
  of("unbalanced", "unbalanced.csv"),
  of("first eight", "first-eight.csv", wild = list(interval = TRUE)),
  of("six", "six.csv", wild = list(interval = TRUE))
))
