# Recomputes a campaign from its export alone, with base R, and finds the same decisions: the F, Welch, F*, Kruskal-Wallis and block tests by R's own
# procedures or textbook formulas, adjusted p-values by p.adjust.
# Rscript record.R FOLDER -> one line "experiment TEST agreed" or a line that begins with FAULT for each experiment; exit status 1 where one is found.
#
# p is compared to 1e-12 relative, as far as R's own doubles carry it: the values are read as doubles and their common leading digits are taken off as
# decimals first, which is exact for what a laboratory writes. A value with more digits than a double holds (none in the shipped campaigns) loses them.
# The permutation test draws with a generator of its own; its p is held against the number of arrangements that the export gives, not drawn again.
options(digits = 17, warn = 1)
folder <- commandArgs(trailingOnly = TRUE)[1]
read <- function(name) {
  path <- file.path(folder, name)
  if (!file.exists(path)) return(NULL)
  d <- read.csv(path, colClasses = "character", check.names = FALSE, encoding = "UTF-8", quote = "\"", na.strings = character(0))
  # The apostrophe before a text that a spreadsheet would take for a formula is no part of it.
  for (n in names(d)) d[[n]] <- sub("^'(?='*[[:space:]\"]*[=+@-])", "", d[[n]], perl = TRUE)
  d
}
number <- function(x) ifelse(x == "", NA, suppressWarnings(as.numeric(x)))

results <- read("results.csv")
exclusions <- read("exclusions.csv")
m <- read(file.path("measurements", "measurements.csv"))
if (!is.null(exclusions)) {
  last <- exclusions[!duplicated(exclusions[c("experiment", "file", "line")], fromLast = TRUE), ]
  out <- last[last$excluded == "true", ]
  m <- m[!(paste(m$experiment, m$file, m$line, sep = "\r") %in% paste(out$experiment, out$file, out$line, sep = "\r")), ]
}
m <- m[m$value != "", ]

# The decimals of a column as whole numbers less their smallest one: what is left is exact in doubles where fewer than 16 digits differ.
shifted <- function(text) {
  text <- sub("^[+]", "", text)
  if (any(grepl("[eE]", text))) return(as.numeric(text) - min(as.numeric(text)))
  decimals <- max(nchar(ifelse(grepl(".", text, fixed = TRUE), sub("^[^.]*[.]", "", text), "")))
  digits <- vapply(text, function(t) {
    fraction <- if (grepl(".", t, fixed = TRUE)) sub("^[^.]*[.]", "", t) else ""
    paste0(sub("[.].*$", "", t), fraction, strrep("0", decimals - nchar(fraction)))
  }, "")
  negative <- startsWith(digits, "-")
  digits <- sub("^-", "", digits)
  width <- max(nchar(digits))
  digits <- paste0(strrep("0", width - nchar(digits)), digits)
  low <- max(1, width - 8)                                   # two parts of at most nine digits: differences of each are exact
  sign <- ifelse(negative, -1, 1)
  head <- if (low > 1) sign * as.numeric(substr(digits, 1, low - 1)) else rep(0, length(digits))
  tail <- sign * as.numeric(substr(digits, low, width))
  (head - head[1]) * 10^(width - low + 1) + (tail - tail[1])
}

sums <- function(d) {                                        # between and within, from deviations
  y <- d$y - mean(d$y); g <- factor(d$group)
  means <- tapply(y, g, mean); n <- tapply(y, g, length)
  list(between = sum(n * (means - mean(y))^2), within = sum((y - means[g])^2), k = nlevels(g), n = length(y), means = means, counts = n, variances = tapply(y, g, var))
}
upper <- function(statistic, a, b) pf(statistic, a, b, lower.tail = FALSE)
tests <- list(
  f = function(d) { s <- sums(d); f <- (s$between / (s$k - 1)) / (s$within / (s$n - s$k)); c(f, upper(f, s$k - 1, s$n - s$k)) },
  welch = function(d) { w <- oneway.test(y ~ group, d); c(w$statistic, upper(w$statistic, w$parameter[1], w$parameter[2])) },
  `brown-forsythe` = function(d) {
    s <- sums(d); share <- s$counts / s$n; v <- s$variances; parts <- (1 - share) * v
    df1 <- sum(parts)^2 / (sum(share * v)^2 + sum((1 - 2 * share) * v^2))         # Mehrotra (1997)
    f <- s$between / sum(parts); c(f, upper(f, df1, sum(parts)^2 / sum(parts^2 / (s$counts - 1))))
  },
  `kruskal-wallis` = function(d) { k <- kruskal.test(d$y, factor(d$group)); c(k$statistic, pchisq(k$statistic, k$parameter, lower.tail = FALSE)) },
  `block-f` = function(d) { a <- anova(lm(y ~ factor(block) + factor(group), d)); c(a$F[2], upper(a$F[2], a$Df[2], a$Df[3])) })

near <- function(a, b, most) (is.na(a) && is.na(b)) || isTRUE(a == b) || isTRUE(abs(a - b) <= most * abs(b))
faults <- 0
fault <- function(...) { faults <<- faults + 1; cat("FAULT", ..., "\n") }

recomputed <- rep(NA_real_, nrow(results))
for (i in seq_len(nrow(results))) {
  r <- results[i, ]
  if (r$p == "") next
  d <- m[m$experiment == r$experiment, ]
  d$y <- shifted(d$value)
  if (any(d$specimen != "")) {                               # readings of one specimen are one observation: their mean
    key <- ifelse(d$specimen == "", paste0("\r", seq_len(nrow(d))), d$specimen)
    d <- do.call(rbind, lapply(split(d, list(d$group, d$block, key), drop = TRUE), function(x) { x$y[1] <- mean(x$y); x[1, ] }))
  }
  if (r$test == "permutation") {
    recomputed[i] <- number(r$p)
    steps <- number(r$p) * (number(r$arrangements) + if (r$seed == "") 0 else 1)
    if (abs(steps - round(steps)) > 1e-6) fault(r$experiment, "p", r$p, "is no share of", r$arrangements, "arrangements")
    cat(r$experiment, r$test, "taken from the export\n")
    next
  }
  now <- tests[[r$test]](d)
  recomputed[i] <- now[2]
  # Below the normal range of doubles a p-value has fewer digits.
  if (!near(now[1], number(r$statistic), 1e-12)) fault(r$experiment, r$test, "statistic", now[1], "instead of", r$statistic)
  tolerance <- 1e-12 * max(1, abs(log(max(now[2], 1e-320))))
  if (!near(now[2], number(r$p), if (now[2] < 1e-300) 1e-6 else tolerance)) fault(r$experiment, r$test, "p", now[2], "instead of", r$p)
  else cat(r$experiment, r$test, "agreed\n")
}

# The correction, over every hypothesis of the family: one without a result counts as p = 1.
campaign <- paste(readLines(file.path(folder, "campaign.json"), warn = FALSE), collapse = "\n")
correction <- sub('.*"correction": *"([^"]*)".*', "\\1", campaign)
level <- as.numeric(sub('.*"level": *([0-9.eE+-]*).*', "\\1", campaign))
method <- c(none = "none", bonferroni = "bonferroni", holm = "holm", hochberg = "hochberg", hommel = "hommel", bh = "BH", by = "BY")[correction]
if (is.na(method)) { cat("the correction", correction, "is none of p.adjust\n") } else {
  counted <- ifelse(is.na(recomputed), 1, recomputed)
  adjusted <- p.adjust(counted, method)
  for (i in seq_len(nrow(results))) {
    r <- results[i, ]
    if (r$p == "") { if (r$survives != "") fault(r$experiment, "has no p and a decision"); next }
    if (!near(adjusted[i], number(r$adjusted_p), if (adjusted[i] < 1e-300) 1e-6 else 1e-12 * max(1, abs(log(max(adjusted[i], 1e-320)))))) fault(r$experiment, "adjusted p", adjusted[i], "instead of", r$adjusted_p)
    if ((adjusted[i] <= level) != (r$survives == "true")) fault(r$experiment, "decision", adjusted[i] <= level, "instead of", r$survives)
  }
}

cat(nrow(results), "experiments,", sum(!is.na(recomputed)), "with a result,", sum(results$survives == "true"), "survivors,", faults, "faults\n")
quit(status = if (faults > 0) 1 else 0)
