# Reference values of tests/unit/analysis/comparison/equivalence.test.ts. Run: Rscript tests/reference/games-howell.R
options(digits = 15)
g <- split(PlantGrowth$weight, PlantGrowth$group)
for (p in list(c(1, 2), c(1, 3), c(2, 3))) {
  a <- g[[p[1]]]; b <- g[[p[2]]]
  u <- var(a) / length(a); v <- var(b) / length(b)
  nu <- (u + v)^2 / (u^2 / (length(a) - 1) + v^2 / (length(b) - 1))
  q <- abs(mean(a) - mean(b)) / sqrt((u + v) / 2)
  print(c(mean(a) - mean(b), nu, ptukey(q, 3, nu, lower.tail = FALSE), qtukey(.95, 3, nu) * sqrt((u + v) / 2)))
}
# two one-sided tests of 100.0 (u 1.0, 6 degrees of freedom) against 101.0 (u 1.2, 5)
se <- sqrt(1 + 1.44); nu <- se^4 / (1 / 6 + 1.44^2 / 5)
print(c(se, nu, -1 - qt(.95, nu) * se, -1 + qt(.95, nu) * se, -1 - qt(.975, nu) * se))
