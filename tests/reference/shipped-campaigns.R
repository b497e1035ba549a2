# The campaigns that ship, tested by R: one row an experiment -> shipped-campaigns.csv
# Run from this folder: Rscript shipped-campaigns.R
# F and p by oneway.test(var.equal = TRUE); adjusted p-values by p.adjust over all planned experiments, the untested as p = 1.
# For the NIST sets F is the value certified by NIST (15 digits): R reads binary doubles and loses up to all digits there.
options(digits = 17)
root <- file.path("..", "..", "campaigns")

read_plain <- function(file) {
  separator <- if (grepl(";", readLines(file, 1))) ";" else ","
  read.csv(file, sep = separator, check.names = FALSE, colClasses = c(group = "character"))[, c("experiment", "group", "value")]
}
measurements <- function(campaign)
  do.call(rbind, lapply(list.files(file.path(root, campaign, "measurements"), "[.]csv$", full.names = TRUE), read_plain))

certified <- c(SiRstv = 1.18046237440255, SmLs01 = 21, SmLs02 = 201, SmLs03 = 2001, AtmWtAg = 15.9467335677930,
               SmLs04 = 21, SmLs05 = 201, SmLs06 = 2001, SmLs07 = 21, SmLs08 = 201, SmLs09 = 2001)

# Published data are what R ships.
classics <- measurements("published-classics")
same <- function(name, values) stopifnot(identical(sort(as.numeric(classics$value[classics$experiment == name])), sort(as.numeric(values))))
same("PlantGrowth", PlantGrowth$weight); same("InsectSprays", InsectSprays$count); same("chickwts", chickwts$weight)
same("warpbreaks", warpbreaks$breaks); same("iris", iris$Sepal.Length); same("morley", morley$Speed)
same("sleep", sleep$extra); same("airquality", airquality$Ozone[!is.na(airquality$Ozone)])

test <- function(x) {
  within <- tapply(x$value, x$group, var)
  if (nrow(x) == 0) return(data.frame(F = NA, df1 = NA, df2 = NA, source = "no data"))
  if (all(within == 0)) return(data.frame(F = NA, df1 = NA, df2 = NA, source = "no variation within groups"))
  name <- x$experiment[1]
  o <- oneway.test(value ~ group, x, var.equal = TRUE)
  f <- if (name %in% names(certified)) certified[[name]] else o$statistic[[1]]
  data.frame(F = f, df1 = o$parameter[[1]], df2 = o$parameter[[2]], source = if (name %in% names(certified)) "NIST certified F" else "R")
}

judge <- function(campaign) {
  plan <- read.csv(file.path(root, campaign, "plan.csv"), colClasses = "character")
  d <- measurements(campaign)
  stopifnot(all(d$experiment %in% plan$experiment))
  d <- d[!is.na(d$value), ]
  r <- cbind(campaign, experiment = plan$experiment,
             observations = as.integer(table(factor(d$experiment, plan$experiment))),
             do.call(rbind, lapply(plan$experiment, function(e) test(d[d$experiment == e, ]))))
  r$p <- pf(r$F, r$df1, r$df2, lower.tail = FALSE)
  r$ln_p <- pf(r$F, r$df1, r$df2, lower.tail = FALSE, log.p = TRUE)
  counted <- ifelse(is.na(r$p), 1, r$p)
  for (m in c("bonferroni", "holm", "hommel", "BH", "BY")) r[[tolower(m)]] <- ifelse(is.na(r$p), NA, p.adjust(counted, m))
  cat(sprintf("%s: %d planned, %d tested; survivors at 0.05: none %d, bh %d, by %d, hommel %d, holm %d, bonferroni %d\n", campaign, nrow(r), sum(!is.na(r$p)),
              sum(counted <= 0.05), sum(r$bh <= 0.05, na.rm = TRUE), sum(r$by <= 0.05, na.rm = TRUE), sum(r$hommel <= 0.05, na.rm = TRUE),
              sum(r$holm <= 0.05, na.rm = TRUE), sum(r$bonferroni <= 0.05, na.rm = TRUE)))
  r
}

r <- do.call(rbind, lapply(c("adhesion-screen", "nist-one-way", "published-classics"), judge))
for (n in c("F", "p", "ln_p", "bonferroni", "holm", "hommel", "bh", "by"))
  r[[n]] <- ifelse(is.na(r[[n]]), "", formatC(r[[n]], digits = 17, format = "g", width = 1))
out <- file("shipped-campaigns.csv", "wb")
writeLines(c("# F, p and adjusted p-values of the campaigns that ship. Made by shipped-campaigns.R (R 4.2.2: oneway.test, pf, p.adjust).",
             "# source: R, or the F certified by NIST (then only p is R's), or why the experiment has no test; it then counts as p = 1.",
             "# p = 0 means below the smallest double: compare ln_p."), out, sep = "\n")
write.table(r[, c("campaign", "experiment", "observations", "source", "F", "df1", "df2", "p", "ln_p", "bonferroni", "holm", "hommel", "bh", "by")],
            out, sep = ",", quote = FALSE, row.names = FALSE, na = "", eol = "\n")
close(out)
