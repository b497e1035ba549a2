# Milliseconds, median of seven: Bonferroni, Holm and BH of a million p-values, and a million F tails with their logarithms.
milliseconds <- function(work) median(replicate(7, system.time(work())[["elapsed"]])) * 1000
set.seed(1)
p <- runif(1e6)^2
F <- rexp(1e6) * 2
cat(sprintf("adjust %.1f\n", milliseconds(function() for (m in c("bonferroni", "holm", "BH")) p.adjust(p, m))))
cat(sprintf("tails %.1f\n", milliseconds(function() pf(F, 4, 45, lower.tail = FALSE, log.p = TRUE))))
# Tails of the studentized range are slow: 20,000 are timed for a million, 2,000 with degrees of freedom of their own for 10,000.
q <- runif(20000) * 12
cat(sprintf("range %.1f\n", 50 * milliseconds(function() ptukey(q, 5, 45, lower.tail = FALSE))))
cat(sprintf("range-df %.1f\n", 5 * milliseconds(function() ptukey(q[1:2000], 5, 12 + 1:2000 / 200, lower.tail = FALSE))))
