# As sums.R, and every reading and result is kept in a SQLite file: write-ahead log, one index to find an experiment by.
# Arguments: measurements.csv results.csv catalog.db
suppressPackageStartupMessages({ library(data.table); library(RSQLite) })
files <- commandArgs(TRUE)
unlink(paste0(files[3], c("", "-wal", "-shm")))
readings <- fread(files[1], showProgress = FALSE)
store <- dbConnect(SQLite(), files[3], synchronous = NULL)
invisible(dbGetQuery(store, "pragma journal_mode = wal"))
invisible(dbExecute(store, "pragma synchronous = normal"))
dbWriteTable(store, "reading", readings)
invisible(dbExecute(store, "create index reading_experiment on reading(experiment)"))
groups <- readings[, .(n = .N, mean = mean(value), variance = var(value)), by = .(experiment, group)]
tests <- groups[, .(k = .N, N = sum(n), grand = sum(n * mean), within = sum((n - 1) * variance)), by = experiment]
tests[, grand := grand / N]
groups[tests, grand := i.grand, on = "experiment"]
between <- groups[, .(between = sum(n * (mean - grand)^2)), by = experiment]
tests[, `:=`(df1 = k - 1, df2 = N - k)]
tests[, F := (between$between / df1) / (within / df2)]
tests[, p := pf(F, df1, df2, lower.tail = FALSE)]
tests[, `:=`(bonferroni = p.adjust(p, "bonferroni"), holm = p.adjust(p, "holm"), bh = p.adjust(p, "BH"))]
results <- tests[, .(experiment, F, df1, df2, p, bonferroni, holm, bh)]
dbWriteTable(store, "result", results)
dbDisconnect(store)
fwrite(results, files[2])
