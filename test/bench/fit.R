# The same fit by R: glm with identity link and variance mu^2, then the cluster-robust covariance CR3 of the package
# clubSandwich. Run by fit.ts; argument: a CSV file with columns day, L (km), e (mm).
suppressPackageStartupMessages(library(clubSandwich))
d <- read.csv(commandArgs(TRUE)[1]); d$y <- d$e^2; d$l <- d$L^2; d$day <- factor(d$day)
t0 <- proc.time()[["elapsed"]]
f <- glm(y ~ l, data = d, family = quasi(link = "identity", variance = "mu^2"), start = c(mean(d$y)/2, mean(d$y)/2/mean(d$l)))
t1 <- proc.time()[["elapsed"]]
v <- vcovCR(f, cluster = d$day, type = "CR3")
t2 <- proc.time()[["elapsed"]]
cat(sprintf("  R: constant %.4f mm, ppm %.4f, se of ppm^2 %.5f; glm %.2f s, CR3 %.2f s, total %.2f s\n",
  sqrt(coef(f)[[1]]), sqrt(coef(f)[[2]]), sqrt(v[2, 2]), t1 - t0, t2 - t1, t2 - t0))
