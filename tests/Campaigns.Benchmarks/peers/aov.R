# The usual form in R: read.csv, aov() for every experiment, p.adjust.   Arguments: measurements.csv results.csv
files <- commandArgs(TRUE)
readings <- read.csv(files[1], stringsAsFactors = TRUE)
tests <- lapply(split(readings, readings$experiment), function(one) {
  table <- summary(aov(value ~ group, data = one))[[1]]
  c(F = table[["F value"]][1], df1 = table[["Df"]][1], df2 = table[["Df"]][2], p = table[["Pr(>F)"]][1])
})
results <- data.frame(experiment = names(tests), do.call(rbind, tests))
results$bonferroni <- p.adjust(results$p, "bonferroni")
results$holm <- p.adjust(results$p, "holm")
results$bh <- p.adjust(results$p, "BH")
write.csv(results, files[2], row.names = FALSE, quote = FALSE)
