# Reference values of tests/unit/analysis/acceptance/acceptance.test.ts. Run: Rscript tests/reference/variance-components.R
options(digits = 15)
g <- factor(c("a", "a", "a", "b", "b", "c", "c", "c", "c"))
y <- c(1.02, 0.98, 1.05, 1.21, 1.18, 0.90, 0.95, 0.93, 0.91)
m <- summary(aov(y ~ g))[[1]]
print(m)
n <- table(g); n0 <- (length(y) - sum(n^2) / length(y)) / (length(n) - 1)
print(c(m$`Mean Sq`[2], (m$`Mean Sq`[1] - m$`Mean Sq`[2]) / n0, m$`Pr(>F)`[1]))
x <- c(10.1, 9.8, 10.3, 10.0, 9.9, 10.2)
print(mean(x) + c(-1, 1) * qt(.975, 5) * sd(x) * sqrt(1 + 1 / 6))
print(mean(x) + c(-1, 1) * qt(.9985, 5) * sd(x) * sqrt(1 + 1 / 6))
