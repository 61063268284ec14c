# Rscript tests/reference/make.R: writes every folder's expected.json anew (about three minutes).
here <- dirname(normalizePath(sub("^--file=", "", grep("^--file=", commandArgs(FALSE), value = TRUE))))
for (script in Sys.glob(file.path(here, "*", "generate.R"))) {
  message(script)
  if (system2("Rscript", script) != 0) stop("failed: ", script)
}
