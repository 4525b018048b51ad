#!/usr/bin/env Rscript
# Writes four public data sets that come in GPL packages as CSV (header label,c1..cd) into the folder given as argument.
# Needs the R packages mlbench and MASS (Debian: r-cran-mlbench, r-cran-mass). The data are never copied into this repository.
arguments <- commandArgs(trailingOnly = TRUE)
if (length(arguments) != 1) stop("usage: Rscript export-check-sets.R OUTPUT_FOLDER")
folder <- arguments[1]
dir.create(folder, showWarnings = FALSE, recursive = TRUE)
options(scipen = 100)

write_set <- function(name, label, values) {
  # as.character gives 15 significant digits in the shortest form; factors give their level.
  columns <- lapply(as.data.frame(values), as.character)
  rows <- do.call(paste, c(list(gsub(" ", "-", as.character(label))), unname(columns), sep = ","))
  header <- paste(c("label", paste0("c", seq_along(columns))), collapse = ",")
  # Binary mode: the same line ends, and so the same SHA-256, on every system.
  file <- file(file.path(folder, paste0(name, ".csv")), "wb")
  writeLines(c(header, rows), file, sep = "\n")
  close(file)
}

data(Satellite, package = "mlbench")
write_set("satellite", Satellite$classes, Satellite[, 1:36])
data(DNA, package = "mlbench")
write_set("dna", DNA$Class, DNA[, 1:180])
data(Vowel, package = "mlbench")
write_set("vowel-mlbench", Vowel$Class, Vowel[, 2:10])
data(crabs, package = "MASS")
write_set("crabs-sp-sex", paste(crabs$sp, crabs$sex, sep = "-"), crabs[, 4:8])
