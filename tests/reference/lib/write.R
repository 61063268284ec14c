# Runs one analysis of a data file and writes the folder's expected.json and versions.txt.

# 17 significant digits, so that each double is read back as it was; NA becomes null.
as_json <- function(x, indent = "") {
  inner <- paste0(indent, " ")
  if (is.null(x)) return("null")
  if (inherits(x, "AsIs") || (is.list(x) && is.null(names(x))) || (is.atomic(x) && length(x) != 1)) {
    parts <- vapply(as.list(unclass(x)), as_json, "", indent = inner)
    if (!length(parts)) return("[]")
    return(paste0("[\n", inner, paste(parts, collapse = paste0(",\n", inner)), "\n", indent, "]"))
  }
  if (is.list(x)) {
    parts <- paste0("\"", names(x), "\": ", vapply(x, as_json, "", indent = inner))
    return(paste0("{\n", inner, paste(parts, collapse = paste0(",\n", inner)), "\n", indent, "}"))
  }
  if (is.na(x)) return("null")
  if (is.logical(x)) return(if (x) "true" else "false")
  if (is.numeric(x)) return(sprintf("%.17g", x))
  as.character(toJSON(as.character(x), auto_unbox = TRUE))
}

analysis_facts <- function(name, data, subject, time, response, group = NULL, wild = list(), serial_draws = 5000) {
  set.seed(20261201)
  d <- long_table(data, subject, time, response, group)
  facts <- list(
    name = name, data = data,
    columns = c(list(subject = subject, time = time, response = response), if (!is.null(group)) list(group = group)),
    structure = structure_facts(d), ols = ols_facts(d), pooled = pooled_facts(d),
    independence = dependence_facts(d, serial_draws), per_subject = line_facts(d),
    band = I(band_facts(d)), within_between = within_between_facts(d)
  )
  if (!is.null(wild)) facts$wild_bootstrap <- do.call(wild_facts, c(list(d), wild))
  facts
}

write_expected <- function(source, analyses) {
  writeLines(as_json(list(source = source, analyses = I(analyses))), "expected.json")
  packages <- c("clubSandwich", "jsonlite", "lme4", "nlme", "sandwich", "geepack")
  lines <- c(R.version.string, vapply(packages, function(p) paste(p, packageVersion(p)), ""))
  writeLines(lines, "versions.txt")
}

# Numbers in the data files are the shortest that read back to the same double.
write_data <- function(d, file = "data.csv") {
  for (k in names(d)) if (is.numeric(d[[k]])) {
    d[[k]] <- vapply(d[[k]], function(v) if (is.na(v)) "" else format(v, digits = 15), "")
  }
  write.csv(d, file, row.names = FALSE, quote = FALSE)
}
