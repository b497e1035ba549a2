# Milliseconds, median of seven: Bonferroni, Holm and BH of a million p-values, and a million F tails with their logarithms.
milliseconds <- function(work) median(replicate(7, system.time(work())[["elapsed"]])) * 1000
set.seed(1)
p <- runif(1e6)^2
F <- rexp(1e6) * 2
cat(sprintf("adjust %.1f\n", milliseconds(function() for (m in c("bonferroni", "holm", "BH")) p.adjust(p, m))))
cat(sprintf("tails %.1f\n", milliseconds(function() pf(F, 4, 45, lower.tail = FALSE, log.p = TRUE))))
