# The campaign of published designs, computed by R from its own package datasets: prints published-designs.csv.
# Run from this folder: Rscript published-designs.R > published-designs.csv
# A row with empty group_a is the test of an experiment, the others its follow-up comparisons, group_b less group_a.
# Tests: anova of lm (with blocks first; on means of specimens), oneway.test, kruskal.test; F* of Brown and Forsythe with Mehrotra's degrees of freedom by its formula; p of the permutation test from 20,000 random permutations.
# Comparisons: TukeyHSD, p.adjust of t (Holm), pf (Scheffe), ptukey (Games-Howell), and Dunnett's law by two nested integrals.
options(digits = 17)
rows <- NULL
add <- function(experiment, group_a = "", group_b = "", observations = NA, statistic, df1 = NA, df2, p, ln_p = NA, difference = NA, lower = NA, upper = NA)
  rows <<- rbind(rows, data.frame(experiment, group_a, group_b, observations, statistic, df1, df2, p, ln_p, difference, lower, upper))
test <- function(experiment, observations, statistic, df1, df2)
  add(experiment, observations = observations, statistic = statistic, df1 = df1, df2 = df2,
      p = pf(statistic, df1, df2, lower.tail = FALSE), ln_p = pf(statistic, df1, df2, lower.tail = FALSE, log.p = TRUE))

# Largest of |T|, the numerators correlated lambda_i lambda_j: Dunnett (1955), over the common deviation s and the shared normal z.
dunnett_tail <- function(t, lambda, df) {
  beyond <- function(z, l, s) pnorm((-l * z - t * s) / sqrt(1 - l^2)) + pnorm((l * z - t * s) / sqrt(1 - l^2))
  outside <- function(s) sapply(s, function(s) integrate(function(z)
    -dnorm(z) * expm1(rowSums(sapply(lambda, function(l) log1p(-beyond(z, l, s))))), -9, 9, rel.tol = 1e-9, abs.tol = 0, subdivisions = 500)$value)
  density <- function(s) exp(log(2) + df / 2 * log(df / 2) - lgamma(df / 2) + (df - 1) * log(s) - df * s^2 / 2)
  centre <- 1 / sqrt(2 * df)
  integrate(function(s) density(s) * outside(s), max(1e-6, 1 - 10 * centre), 1 + 12 * centre, rel.tol = 1e-8, abs.tol = 0, subdivisions = 500)$value
}

# One-way or within blocks on any table of response, group, block: differences with their standard errors from the fit.
comparisons <- function(experiment, d, formula, method, control = NULL, level = 0.95) {
  fit <- lm(formula, d)
  groups <- levels(d$group)
  k <- length(groups)
  df <- df.residual(fit)
  name <- paste0("group", groups)
  at <- function(g) { v <- setNames(numeric(length(coef(fit))), names(coef(fit))); if (name[match(g, groups)] %in% names(v)) v[[name[match(g, groups)]]] <- 1; v }
  pairs <- if (is.null(control)) t(combn(groups, 2)) else cbind(control, setdiff(groups, control))
  m <- nrow(pairs)
  r <- t(apply(pairs, 1, function(p) { w <- at(p[2]) - at(p[1]); c(sum(w * coef(fit)), sqrt(sum(w * (vcov(fit) %*% w)))) }))
  t <- r[, 1] / r[, 2]
  raw <- 2 * pt(-abs(t), df)
  switch(method,
    "tukey" = { p <- ptukey(abs(t) * sqrt(2), k, df, lower.tail = FALSE); half <- qtukey(level, k, df) / sqrt(2); statistic <- t * sqrt(2) },
    "holm" = { p <- p.adjust(raw, "holm"); half <- qt(1 - (1 - level) / (2 * m), df); statistic <- t },
    "scheffe" = { p <- pf(t^2 / (k - 1), k - 1, df, lower.tail = FALSE); half <- sqrt((k - 1) * qf(level, k - 1, df)); statistic <- t^2 / (k - 1) },
    "dunnett" = {
      n <- table(d$group)
      lambda <- as.numeric(sqrt(n[pairs[, 2]] / (n[pairs[, 2]] + n[[control]])))
      p <- if (m == 1) raw else sapply(abs(t), dunnett_tail, lambda, df)
      half <- if (m == 1) qt(1 - (1 - level) / 2, df) else uniroot(function(x) dunnett_tail(x, lambda, df) - (1 - level), c(1.5, 6), tol = 1e-10)$root
      statistic <- t
    })
  for (i in seq_len(m))
    add(experiment, pairs[i, 1], pairs[i, 2], statistic = statistic[i], df2 = df, p = p[i], difference = r[i, 1], lower = r[i, 1] - half * r[i, 2], upper = r[i, 1] + half * r[i, 2])
}
within_blocks <- function(experiment, d, observations, method, control = NULL) {
  a <- anova(lm(response ~ block + group, d))
  test(experiment, observations, a["group", "F value"], a["group", "Df"], a["Residuals", "Df"])
  comparisons(experiment, d, response ~ group + block, method, control)
}
one_way <- function(experiment, d, observations, method) {
  a <- anova(lm(response ~ group, d))
  test(experiment, observations, a["group", "F value"], a["group", "Df"], a["Residuals", "Df"])
  comparisons(experiment, d, response ~ group, method)
}
games_howell <- function(experiment, d, level = 0.95) {
  n <- tapply(d$response, d$group, length); m <- tapply(d$response, d$group, mean); e <- tapply(d$response, d$group, var) / n
  groups <- levels(d$group)
  for (i in seq_len(ncol(combn(groups, 2)))) {
    a <- combn(groups, 2)[1, i]; b <- combn(groups, 2)[2, i]
    se <- sqrt((e[[a]] + e[[b]]) / 2)
    df <- (e[[a]] + e[[b]])^2 / (e[[a]]^2 / (n[[a]] - 1) + e[[b]]^2 / (n[[b]] - 1))
    q <- (m[[b]] - m[[a]]) / se
    half <- qtukey(level, length(groups), df) * se
    add(experiment, a, b, statistic = q, df2 = df, p = ptukey(abs(q), length(groups), df, lower.tail = FALSE), difference = m[[b]] - m[[a]], lower = m[[b]] - m[[a]] - half, upper = m[[b]] - m[[a]] + half)
  }
}
table_of <- function(response, group, levels, block = NA) data.frame(response, group = factor(group, levels), block = factor(block))

within_blocks("sleep", with(sleep, table_of(extra, paste("drug", group), paste("drug", 1:2), ID)), 20, "holm")
within_blocks("warpbreaks", with(warpbreaks, table_of(breaks, tension, c("L", "M", "H"), wool)), 54, "tukey")
within_blocks("npk", with(npk, table_of(yield, ifelse(N == 1, "nitrogen", "none"), c("none", "nitrogen"), block)), 24, "dunnett", "none")
within_blocks("OrchardSprays", with(OrchardSprays, table_of(decrease, treatment, LETTERS[1:8], rowpos)), 64, "dunnett", "H")
within_blocks("ToothGrowth", with(ToothGrowth, table_of(len, dose, c("0.5", "1", "2"), supp)), 60, "scheffe")
duplicates <- aggregate(density ~ conc + Run, as.data.frame(DNase), mean)
within_blocks("DNase", with(duplicates, table_of(density, format(conc, digits = 15, trim = TRUE, drop0trailing = TRUE), format(sort(unique(conc)), digits = 15, trim = TRUE, drop0trailing = TRUE), Run)), 176, "holm")
plants <- aggregate(uptake ~ Plant + Type + Treatment, as.data.frame(CO2), mean)
one_way("CO2", with(plants, table_of(uptake, paste(Type, Treatment), c("Quebec nonchilled", "Quebec chilled", "Mississippi nonchilled", "Mississippi chilled"))), 84, "tukey")

sprays <- with(InsectSprays, table_of(count, spray, LETTERS[1:6]))
welch <- oneway.test(response ~ group, sprays)
test("InsectSprays", 72, welch$statistic[[1]], welch$parameter[[1]], welch$parameter[[2]])
games_howell("InsectSprays", sprays)

ranks <- kruskal.test(Ozone ~ Month, airquality)
add("airquality", observations = sum(!is.na(airquality$Ozone)), statistic = ranks$statistic[[1]], df1 = ranks$parameter[[1]], df2 = NA, p = ranks$p.value,
    ln_p = pchisq(ranks$statistic[[1]], ranks$parameter[[1]], lower.tail = FALSE, log.p = TRUE))

plants <- with(PlantGrowth, table_of(weight, group, c("ctrl", "trt1", "trt2")))
f <- anova(lm(response ~ group, plants))["group", "F value"]
set.seed(1)
# Three groups of ten in order: F rises with the sum of squared group sums.
spread <- function(y) sum(colSums(matrix(y, 10))^2)
extreme <- sum(replicate(20000, spread(sample(plants$response))) >= spread(plants$response) * (1 - 1e-12))
add("PlantGrowth", observations = 30, statistic = f, df2 = NA, p = (extreme + 1) / 20001)
comparisons("PlantGrowth", plants, response ~ group, "dunnett", "ctrl")

feeds <- with(chickwts, table_of(weight, feed, c("horsebean", "linseed", "soybean", "sunflower", "meatmeal", "casein")))
n <- tapply(feeds$response, feeds$group, length); v <- tapply(feeds$response, feeds$group, var); share <- n / sum(n)
D <- sum((1 - share) * v)
test("chickwts", 71, anova(lm(response ~ group, feeds))["group", "Sum Sq"] / D,
     D^2 / (sum(share * v)^2 + sum((1 - 2 * share) * v^2)), D^2 / sum(((1 - share) * v)^2 / (n - 1)))
games_howell("chickwts", feeds)

one_way("morley", with(morley, table_of(Speed, paste("experiment", Expt), paste("experiment", 1:5))), 100, "tukey")

tests <- rows$group_a == ""
rows$bh <- NA
rows$bh[tests] <- p.adjust(rows$p[tests], "BH")
for (column in setdiff(names(rows), c("experiment", "group_a", "group_b")))
  rows[[column]] <- ifelse(is.na(rows[[column]]), "", formatC(rows[[column]], digits = 17, format = "g", width = 1))
cat("# The campaign of published designs by R 4.2.2; made by published-designs.R, which says how.\n")
write.table(rows, stdout(), sep = ",", quote = FALSE, row.names = FALSE, eol = "\n")
