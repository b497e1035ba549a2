# Writes the measurements of the campaign of published designs from R's package datasets: one tidy file an experiment.
# Run from this folder: Rscript published-designs-data.R
folder <- file.path("..", "..", "campaigns", "published-designs", "measurements")
dir.create(folder, recursive = TRUE, showWarnings = FALSE)
text <- function(x) ifelse(is.na(x), "NA", sapply(x, format, digits = 15, scientific = FALSE))
save <- function(experiment, group, ..., value) {
  out <- file(file.path(folder, paste0(tolower(experiment), ".csv")), "wb")
  write.table(data.frame(experiment, group, ..., value = text(value)), out, sep = ",", quote = FALSE, row.names = FALSE, eol = "\n")
  close(out)
}

with(sleep, save("sleep", paste("drug", group), block = paste("patient", ID), value = extra))
with(warpbreaks, save("warpbreaks", tension, block = paste("wool", wool), value = breaks))
with(npk, save("npk", ifelse(N == 1, "nitrogen", "none"), block = block, value = yield))
with(OrchardSprays, save("OrchardSprays", treatment, block = paste("row", rowpos), value = decrease))
with(ToothGrowth, save("ToothGrowth", dose, block = supp, value = len))
with(DNase, save("DNase", conc, specimen = paste("run", Run, "at", conc), block = paste("run", Run), value = density))
with(CO2, save("CO2", paste(Type, Treatment), specimen = Plant, value = uptake))
with(InsectSprays, save("InsectSprays", spray, value = count))
with(airquality, save("airquality", month.name[Month], order = seq_along(Ozone), value = Ozone))
with(PlantGrowth, save("PlantGrowth", group, value = weight))
with(chickwts, save("chickwts", feed, value = weight))
with(morley, save("morley", paste("experiment", Expt), order = 20 * (Expt - 1) + Run, value = Speed))
