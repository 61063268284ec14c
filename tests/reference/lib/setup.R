# Sourced by each generate.R: moves into its folder and loads the shared definitions.
local({
  here <- sub("^--file=", "", grep("^--file=", commandArgs(FALSE), value = TRUE))
  if (length(here)) setwd(dirname(normalizePath(here)))
})
for (f in c("model", "pooled", "dependence", "lines", "wild", "within-between", "write")) {
  source(file.path("..", "lib", paste0(f, ".R")))
}
