# datasets::Orange (Draper & Smith 1998, exercise 24.N): trunk circumference by age of five trees.
args <- sub("^--file=", "", grep("^--file=", commandArgs(FALSE), value = TRUE)); source(file.path(dirname(args), "..", "lib", "setup.R"))

data(Orange, package = "datasets")
d <- data.frame(tree = as.character(Orange$Tree), age = Orange$age, circumference = Orange$circumference)
write_data(d)
write_expected("datasets::Orange", list(
  analysis_facts("trees", "data.csv", "tree", "age", "circumference")
))
