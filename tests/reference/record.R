# Recomputes a campaign from its export alone, with base R, and finds the same decisions: the F, Welch, F*, Kruskal-Wallis and block tests by R's own
# procedures or textbook formulas, adjusted p-values by p.adjust, and by textbook formulas where experiments weigh; family by family, with the gates between
# them. Where experiments are judged as they arrive the p-values are recomputed and the levels are not.
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
if (is.null(m)) m <- data.frame(experiment = character(0), group = character(0), value = character(0))   # nothing was loaded
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

# The correction, family by family, over every hypothesis of it: one without a result counts as p = 1, and one withdrawn before any data has left.
campaign <- paste(readLines(file.path(folder, "campaign.json"), warn = FALSE), collapse = "\n")
correction <- sub('.*"correction": *"([^"]*)".*', "\\1", campaign)
level <- as.numeric(sub('.*"level": *([0-9.eE+-]*).*', "\\1", campaign))
methods <- c(none = "none", bonferroni = "bonferroni", holm = "holm", hochberg = "hochberg", hommel = "hommel", bh = "BH", by = "BY")
online <- c("alpha-spending", "online-fallback", "addis-spending", "lond", "lond-any", "lord", "saffron", "addis")
weighted <- list(                                            # textbook formulas: ranks go by p/w
  `weighted-bonferroni` = function(q, w) q * sum(w),
  `weighted-holm` = function(q, w) cummax(q * rev(cumsum(rev(w)))),
  `weighted-bh` = function(q, w) rev(cummin(rev(q * sum(w) / seq_along(q)))))
adjust <- function(p, w, key) {
  if (!is.na(methods[key])) return(p.adjust(p, methods[key]))
  if (is.null(weighted[[key]])) return(NULL)
  ranks <- order(p / w, is.na(recomputed[members]))          # what was not tested comes last among equals
  adjusted <- numeric(length(p))
  adjusted[ranks] <- pmin(1, weighted[[key]]((p / w)[ranks], w[ranks]))
  adjusted
}

plan <- read("plan.csv")
families <- read("families.csv")
reviews <- read("reviews.csv")
withdrawals <- read("withdrawals.csv")
latest <- reviews[number(reviews$review) == max(c(0, number(reviews$review))), ]
left <- rep(FALSE, nrow(results))
if (!is.null(withdrawals)) {
  last <- withdrawals[!duplicated(withdrawals$experiment, fromLast = TRUE), ]
  left <- results$experiment %in% last$experiment[last$withdrawn == "true" & last$had_data == "false"]
}
at <- match(results$experiment, plan$experiment)
weight <- if (is.null(plan)) rep(1, nrow(results)) else ifelse(is.na(at) | plan$weight[at] == "", 1, number(plan$weight[at]))
named <- if (is.null(families)) rep("", nrow(results)) else plan$family[at]
if (!is.null(families) && any(named != results$family)) fault("the families of the results are not those of the plan")
interim <- nrow(latest) > 0 && latest$interim[1] == "true"
adjusted <- rep(NA_real_, nrow(results))
survives <- rep(NA, nrow(results))
judged <- character(0)

judge <- function(name) {                                    # a family behind a gate after the one that it waits for
  if (name %in% judged) return(invisible())
  members <<- which(named == name & !left & !(interim & is.na(recomputed)))
  own <- if (is.null(families)) NULL else families[families$family == name, ]
  before <- if (is.null(own)) "" else own$opens_after
  open <- TRUE
  if (before != "") {
    judge(before)
    members <<- which(named == name & !left & !(interim & is.na(recomputed)))
    there <- survives[named == before & !left]               # all planned ones, tested or not
    open <- if (own$opens_when == "all") length(there) > 0 && all(there %in% TRUE) else any(there %in% TRUE)
  }
  judged <<- c(judged, name)
  key <- if (!is.null(own) && own$correction != "") own$correction else correction
  r <- results[members, ]
  lines <- latest[latest$experiment %in% r$experiment, ]
  if (any(lines$correction != key)) fault("family", name, "was reviewed by", lines$correction[1], "instead of", key)
  at_level <- unique(number(r$level[r$p != ""]))
  if (length(at_level) == 0) return(invisible())
  if (length(at_level) > 1 || any(number(lines$level) != at_level)) fault("family", name, "has several levels")
  if (is.null(families) && !isTRUE(at_level == level)) fault("the level", at_level, "is not the campaign's", level)
  if (any(number(r$family_size) != length(members))) fault("family", name, "counts", r$family_size[1], "instead of", length(members))
  now <- if (open) adjust(ifelse(is.na(recomputed[members]), 1, recomputed[members]), weight[members], key) else rep(1, length(members))
  if (is.null(now)) { cat("the correction", key, if (name != "") paste("of family", name), "is not recomputed: it is none of p.adjust\n"); return(invisible()) }
  adjusted[members] <<- now
  survives[members] <<- !is.na(recomputed[members]) & now <= at_level[1]
  if (name != "") cat("family", name, key, if (open) "open" else "closed", "level", r$level[r$p != ""][1], "recomputed\n")
}

if (correction %in% online) {
  decisions <- read("decisions.csv")
  cat("the decisions are not recomputed: the campaign is judged as its experiments arrive, by", correction, "- the p-values are, and each decision is held against the level that the export gives\n")
  for (i in seq_len(nrow(decisions))) {
    d <- decisions[i, ]
    p <- recomputed[results$experiment == d$experiment]
    if (d$p == "") { if (d$survives != "") fault(d$experiment, "has no p and a decision"); next }
    if (!near(p, number(d$p), 1e-10)) fault(d$experiment, "was decided by p", d$p, "and has", p)
    if ((p <= number(d$level)) != (d$survives == "true")) fault(d$experiment, "decision", p <= number(d$level), "instead of", d$survives)
  }
} else {
  for (name in unique(named)) judge(name)
  for (i in seq_len(nrow(results))) {
    r <- results[i, ]
    if (r$p == "") { if (r$survives != "") fault(r$experiment, "has no p and a decision"); next }
    if (is.na(survives[i])) next
    if (!near(adjusted[i], number(r$adjusted_p), if (adjusted[i] < 1e-300) 1e-6 else 1e-12 * max(1, abs(log(max(adjusted[i], 1e-320)))))) fault(r$experiment, "adjusted p", adjusted[i], "instead of", r$adjusted_p)
    if (survives[i] != (r$survives == "true")) fault(r$experiment, "decision", survives[i], "instead of", r$survives)
  }
}

cat(nrow(results), "experiments,", sum(!is.na(recomputed)), "with a result,", sum(results$survives == "true"), "survivors,", faults, "faults\n")
quit(status = if (faults > 0) 1 else 0)
