# Cross-check of fieller.json and student.json by R. On stdin "case,arm,x,y"; on
# stdout first the Student quantiles, then for each case and both ways of
# taking the residual variance: crossing, u, t, limits. Called by fieller.py.
d <- read.csv(file("stdin"), colClasses = c("character", "integer", "numeric", "numeric"))
cat("# R ", R.version$major, ".", R.version$minor, "\n", sep = "")
cat("what,key,a,b,c,d,e\n")
for (dof in 1:40) cat(sprintf("t,%d,%.16g,%.16g,%.16g,,\n", dof, qt(0.95, dof), qt(0.975, dof), qt(0.995, dof)))
for (name in unique(d$case)) {
  fits <- lapply(1:2, function(k) lm(y ~ x, data = d[d$case == name & d$arm == k, ]))
  rss <- sapply(fits, deviance)
  free <- sapply(fits, df.residual)
  for (way in c("pooled", "separate")) {
    s2 <- if (way == "pooled") rep(sum(rss) / sum(free), 2) else rss / free
    v <- Reduce(`+`, lapply(1:2, function(k) s2[k] * summary(fits[[k]])$cov.unscaled)) # of (intercept, slope) differences
    a <- coef(fits[[2]])[[1]] - coef(fits[[1]])[[1]]
    b <- coef(fits[[1]])[[2]] - coef(fits[[2]])[[2]]
    x <- a / b
    u <- sqrt(v[1, 1] + 2 * x * v[1, 2] + x^2 * v[2, 2]) / abs(b)
    t <- qt(0.975, sum(free))
    # (a - z b)^2 <= t^2 (v11 + 2 z v12 + z^2 v22)
    p <- b^2 - t^2 * v[2, 2]
    q <- a * b + t^2 * v[1, 2]
    r <- a^2 - t^2 * v[1, 1]
    root <- sqrt(q^2 - p * r)
    limits <- if (p > 0) sprintf("%.15g,%.15g", (q - root) / p, (q + root) / p) else ","
    cat(sprintf("%s,%s,%.15g,%.15g,%.15g,%s\n", way, name, x, u, t, limits))
  }
}
