# Cross-check of smoothing.json by R: reads "case,lambda,x,y,w" on stdin, writes
# "case,lambda,i,g,df" on stdout. Called by smoothing.py.
#
# smooth.spline maps x to [0, 1] and scales the weights to a sum of n, so for
#   sum w (y - g)^2 + lambda integral g''^2
# its own lambda is lambda * n / (sum(w) * range^3). Its Gram matrix holds .3330
# for 1/3 (sgram.f), which smoothing.py repeats before it compares.
d <- read.csv(file("stdin"), colClasses = c("character", "character", "numeric", "numeric", "numeric"))
cat("# R ", R.version$major, ".", R.version$minor, ", smooth.spline(all.knots = TRUE)\n", sep = "")
cat("case,lambda,i,g,df\n")
for (key in unique(paste(d$case, d$lambda))) {
  q <- d[paste(d$case, d$lambda) == key, ]
  range <- max(q$x) - min(q$x)
  own <- as.numeric(q$lambda[1]) * nrow(q) / (sum(q$w) * range^3)
  f <- smooth.spline(q$x, q$y, w = q$w, lambda = own, all.knots = TRUE, tol = 1e-9 * range)
  stopifnot(length(f$y) == nrow(q))
  cat(sprintf("%s,%s,%d,%.15g,%.15g\n", q$case[1], q$lambda[1], seq_along(f$y) - 1L, f$y, f$df), sep = "")
}
