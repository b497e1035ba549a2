# R base p.adjust on every vector; plus NA and n > length variants. Run in the folder of the tables: Rscript generate/03_adjust_r.R
options(digits=17)
put <- function(x, name, note) { writeLines(paste("#", note), name); suppressWarnings(write.table(x, name, append=TRUE, sep=",", row.names=FALSE, quote=FALSE)) }
f <- function(x) ifelse(is.na(x), "NaN", formatC(x, digits=17, format="g", width=1))
d <- read.csv("pvectors.csv", comment.char="#", colClasses=c("character","integer","character"))
d$pn <- as.numeric(d$p)
ms <- c("bonferroni","holm","hochberg","hommel","BH","BY")
out <- do.call(rbind, lapply(unique(d$set), function(s) {
  e <- d[d$set==s,]
  r <- sapply(ms, function(k) f(p.adjust(e$pn, k)))
  data.frame(set=s, index=e$index, p=f(e$pn), matrix(r, nrow=nrow(e), dimnames=list(NULL, ms)))
}))
put(out, "adjust_r.csv", "adjusted p-values by p.adjust of R 4.2.2; generator: generate/03_adjust_r.R")
v <- list(na = list(p=c(0.01, NA, 0.04, 0.03, NA, 0.2), n=NULL), planned8 = list(p=c(0.01,0.02,0.03,0.04,0.05), n=8),
          planned20_bh1995 = list(p=d$pn[d$set=="m15_bh1995"], n=20))
o2 <- do.call(rbind, lapply(names(v), function(k) { e <- v[[k]]
  r <- sapply(ms, function(m) f(if (is.null(e$n)) p.adjust(e$p, m) else p.adjust(e$p, m, n=e$n)))
  data.frame(set=k, index=seq_along(e$p), n=if (is.null(e$n)) sum(!is.na(e$p)) else e$n, p=f(e$p), matrix(r, ncol=6, dimnames=list(NULL, ms)))
}))
put(o2, "adjust_r_planned_and_missing.csv", "p.adjust of R 4.2.2 with missing values, and with n larger than the number of p-values; generator: generate/03_adjust_r.R")
print(o2[1:11,]); cat(R.version.string, "\n")
