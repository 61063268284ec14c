# nlme::Orthodont (Potthoff & Roy 1964, Biometrika 51:313-326): distance by age, 16 boys, 11 girls.
# "eleven" (6 boys, 5 girls) is the size at which the bootstrap draws six-point weights.
args <- sub("^--file=", "", grep("^--file=", commandArgs(FALSE), value = TRUE)); source(file.path(dirname(args), "..", "lib", "setup.R"))

data(Orthodont, package = "nlme")
d <- data.frame(subject = as.character(Orthodont$Subject), age = Orthodont$age,
  distance = Orthodont$distance, sex = as.character(Orthodont$Sex))
write_data(d)
write_data(d[d$subject %in% c(sprintf("M%02d", 1:6), sprintf("F%02d", 1:5)), ], "eleven.csv")

of <- function(name, file, ...) analysis_facts(name, file, "subject", "age", "distance", ...)
write_expected("nlme::Orthodont", list(
  of("without group", "data.csv"),
  of("by sex", "data.csv", group = "sex"),
  of("eleven by sex", "eleven.csv", group = "sex")
))
