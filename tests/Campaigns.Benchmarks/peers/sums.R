# The fast form in R: data.table reads three columns, one grouped pass gives n, mean and variance of every group,
# and F, p and the three adjustments follow on whole columns. Nothing is stored.   Arguments: measurements.csv results.csv
suppressPackageStartupMessages(library(data.table))
files <- commandArgs(TRUE)
readings <- fread(files[1], select = c("experiment", "group", "value"), showProgress = FALSE)
groups <- readings[, .(n = .N, mean = mean(value), variance = var(value)), by = .(experiment, group)]
tests <- groups[, .(k = .N, N = sum(n), grand = sum(n * mean), within = sum((n - 1) * variance)), by = experiment]
tests[, grand := grand / N]
groups[tests, grand := i.grand, on = "experiment"]
between <- groups[, .(between = sum(n * (mean - grand)^2)), by = experiment]
tests[, `:=`(df1 = k - 1, df2 = N - k)]
tests[, F := (between$between / df1) / (within / df2)]
tests[, p := pf(F, df1, df2, lower.tail = FALSE)]
tests[, `:=`(bonferroni = p.adjust(p, "bonferroni"), holm = p.adjust(p, "holm"), bh = p.adjust(p, "BH"))]
fwrite(tests[, .(experiment, F, df1, df2, p, bonferroni, holm, bh)], files[2])
