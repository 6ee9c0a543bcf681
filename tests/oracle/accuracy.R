# Prints R's log density (or log probability) of the noncentral t at the points of a reference table:
# Rscript accuracy.R density|band TABLE
arguments <- commandArgs(trailingOnly = TRUE)
table <- read.csv(arguments[2], comment.char = "#", colClasses = "character")
number <- function(x) as.numeric(x)
answers <- suppressWarnings(
  if (arguments[1] == "density") {
    mapply(function(t, df, ncp) tryCatch(dt(t, df, ncp, log = TRUE), error = function(e) NaN),
           number(table$t), number(table$df), number(table$ncp))
  } else {
    mapply(function(low, high, df, ncp) {
      if (is.infinite(low)) pt(high, df, ncp, log.p = TRUE)
      else if (is.infinite(high)) pt(low, df, ncp, lower.tail = FALSE, log.p = TRUE)
      else log(pt(high, df, ncp) - pt(low, df, ncp))
    }, number(table$low), number(table$high), number(table$df), number(table$ncp))
  })
cat("#", R.version.string, "\n")
cat(sprintf("%.17g\n", answers), sep = "")
