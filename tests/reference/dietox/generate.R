# geepack::dietox (Lauridsen, Hojsgaard & Sorensen 1999): weight of 72 pigs over 12 weeks, by dose of
# vitamin E (three levels, so the slopes are compared by a joint test).
args <- sub("^--file=", "", grep("^--file=", commandArgs(FALSE), value = TRUE)); source(file.path(dirname(args), "..", "lib", "setup.R"))

data(dietox, package = "geepack")
d <- data.frame(pig = as.character(dietox$Pig), week = dietox$Time, weight = dietox$Weight,
  vitamin = as.character(dietox$Evit))
write_data(d)
of <- function(name, ...) analysis_facts(name, "data.csv", "pig", "week", "weight", serial_draws = 2000, ...)
write_expected("geepack::dietox", list(of("without group"), of("by vitamin", group = "vitamin")))
