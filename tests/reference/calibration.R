# Reference values of tests/unit/analysis/calibration/calibration.test.ts. Run: Rscript tests/reference/calibration.R
options(digits = 15)
x <- c(1, 2, 4, 6, 8, 10)
y <- c(10.1, 19.7, 40.6, 59.8, 81.1, 99.4)
m <- lm(y ~ x)
print(coef(m)); print(summary(m)$coefficients)
print(anova(m, lm(y ~ x + I(x^2)))$`Pr(>F)`[2])
s <- summary(m)$sigma; b <- coef(m)[[2]]; a <- coef(m)[[1]]
x0 <- (50 - a) / b
print(x0); print(s / b * sqrt(1 / 3 + 1 / 6 + (50 - mean(y))^2 / (b^2 * sum((x - mean(x))^2))))
w <- lm(y ~ x, weights = 1 / x^2)
print(summary(w)$coefficients)
