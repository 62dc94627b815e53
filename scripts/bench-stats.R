#!/usr/bin/env Rscript
# R's side of bench-stats.ts. Reads 'task<TAB>data' lines, runs the task on the columns
# data.COLUMN.f64 of the folder given, and answers one JSON line each: elapsed seconds
# (columns already read) and the numbers to compare.
here <- dirname(normalizePath(sub("^--file=", "", grep("^--file=", commandArgs(FALSE), value = TRUE)[1])))
folder <- commandArgs(TRUE)[1]

tasks <- list()
for (file in list.files(file.path(here, "bench-stats"), "\\.R$", full.names = TRUE)) source(file)

columns <- list()
read_data <- function(name) {
  if (is.null(columns[[name]])) {
    files <- Sys.glob(file.path(folder, paste0(name, ".*.f64")))
    one <- lapply(files, function(f) readBin(f, "double", file.size(f) / 8, endian = "little"))
    columns[[name]] <<- as.data.frame(setNames(one, sub("\\.f64$", "", sub(paste0(name, "."), "", basename(files), fixed = TRUE))))
  }
  columns[[name]]
}

answer <- function(line) {
  part <- strsplit(line, "\t")[[1]]
  task <- tasks[[part[1]]]
  if (is.null(task)) return(sprintf('{"task":"%s","error":"R has no such task"}', part[1]))
  d <- read_data(part[2])
  gc(FALSE)
  tryCatch({
    took <- system.time(value <- task(d))[["elapsed"]]
    sprintf('{"task":"%s","seconds":%.6f,"value":[%s]}', part[1], took, paste(sprintf("%.17g", as.numeric(value)), collapse = ","))
  }, error = function(e) sprintf('{"task":"%s","error":"%s"}', part[1], gsub('["\n\\\\]', " ", conditionMessage(e))))
}

input <- file("stdin", "r")
while (length(line <- readLines(input, 1)) > 0) {
  cat(answer(line), "\n", sep = "")
  flush(stdout())
}
