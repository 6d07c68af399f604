# Pointwise confidence interval of a fitted line, by R's own lm and predict.
# Run: Rscript tests/reference/line-at.R > tests/reference/line-at.json
temperature <- c(488.17, 498.16, 508.14, 518.17, 528.15, 538.15, 548.2)
y <- c(-.104, .2448, .5912, .9295, 1.2521, 1.5653, 1.8515)
x <- 1 / temperature
fit <- lm(y ~ x)
at <- c(480, 505, 523.15, 560)
p <- predict(fit, data.frame(x = 1 / at), se.fit = TRUE, interval = "confidence", level = 0.95)
num <- function(v) paste0("[", paste(format(v, digits = 15), collapse = ", "), "]")
cat("{\n")
cat("  \"version\": \"", R.version.string, "\",\n", sep = "")
cat("  \"temperatureK\": ", num(temperature), ",\n", sep = "")
cat("  \"lnRate\": ", num(y), ",\n", sep = "")
cat("  \"atK\": ", num(at), ",\n", sep = "")
cat("  \"fit\": ", num(p$fit[, "fit"]), ",\n", sep = "")
cat("  \"se\": ", num(p$se.fit), ",\n", sep = "")
cat("  \"lower\": ", num(p$fit[, "lwr"]), ",\n", sep = "")
cat("  \"upper\": ", num(p$fit[, "upr"]), "\n}\n", sep = "")
