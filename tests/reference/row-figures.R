# Figures of a ranking row beside the line: value and first-order uncertainty by R's own symbolic derivatives (stats::deriv), the mean by stats::var.
# Run: Rscript tests/reference/row-figures.R > tests/reference/row-figures.json
num <- function(v) if (length(v) == 1) format(v, digits = 15) else paste0("[", paste(format(v, digits = 15), collapse = ", "), "]")
carry <- function(expression, at, own, shared) {
  f <- deriv(expression, names(at))
  value <- eval(f, as.list(at))
  gradient <- attr(value, "gradient")[1, ]
  list(
    value = as.numeric(value),
    own = sqrt(sum((gradient[names(own)] * own)^2)),
    parts = abs(gradient[names(own)] * own),
    shared = apply(shared, 1, function(effect) sum(gradient[colnames(shared)] * effect))
  )
}

# temperature for a conversion of 2 %: ln X straight in 1/T between two holds
tem <- carry(
  quote(1 / (1 / T1 + (log(0.02) - log(X1)) / (log(X2) - log(X1)) * (1 / T2 - 1 / T1))),
  c(X1 = 0.0153, X2 = 0.0241, T1 = 503.21, T2 = 513.16),
  c(X1 = 9e-5, X2 = 1.4e-4, T1 = 0.03, T2 = 0.04),
  # rows: response factor of methane, thermocouple
  rbind(factor = c(X1 = 1.53e-4, X2 = 2.41e-4, T1 = 0, T2 = 0), thermocouple = c(0, 0, 0.8, 0.8))
)
# degrees of freedom after Welch and Satterthwaite: conversions pooled on 24, temperatures without limit
nu <- tem$own^4 / ((sum(tem$parts[1:2]^2))^2 / 24)

# selectivity at 2 %: straight in X between two holds
sel <- carry(
  quote(S1 + (0.02 - X1) / (X2 - X1) * (S2 - S1)),
  c(S1 = 0.972, S2 = 0.958, X1 = 0.0153, X2 = 0.0241),
  c(S1 = 0.0021, S2 = 0.0019, X1 = 9e-5, X2 = 1.4e-4),
  rbind(factor = c(S1 = 0.0003, S2 = 0.0004, X1 = 1.53e-4, X2 = 2.41e-4))
)

# loss of activity between hold 4 and its return 14.2 h later, brought to one temperature
loss <- carry(
  quote(-(log(r2 / r1) + E / 8.31446261815324 * (1 / T2 - 1 / T1)) / 14.2),
  c(r1 = 1.94e-3, r2 = 1.66e-3, T1 = 523.16, T2 = 523.31, E = 78200),
  c(r1 = 8e-6, r2 = 9e-6, T1 = 0.03, T2 = 0.03, E = 640),
  # flow: the same relative error of both; drift of a thermocouple: of the later alone
  rbind(flow = c(r1 = 1.94e-5, r2 = 1.66e-5, T1 = 0, T2 = 0, E = 0), drift = c(0, 0, 0, 0.5, 0))
)

# mean of four numbers that differ by more than their own uncertainties, and of four that do not
mean_of <- function(v, u, nu) {
  n <- length(v)
  inside <- sum(u^2) / n^2
  between <- max(0, var(v) / n - inside)
  c(mean(v), sqrt(inside + between), (inside + between)^2 / (sum((u / n)^4 / nu) + between^2 / (n - 1)))
}
apart <- mean_of(c(0.991, 1.004, 1.012, 0.998), c(0.004, 0.005, 0.004, 0.006), c(9, 12, 9, 7))
close <- mean_of(c(0.999, 1.001, 1.002, 1.000), c(0.004, 0.005, 0.004, 0.006), c(9, 12, 9, 7))

one <- function(name, x, more = "") cat("  \"", name, "\": { \"value\": ", num(x$value), ", \"own\": ", num(x$own), ", \"shared\": ",
  paste0("[", paste(format(x$shared, digits = 15), collapse = ", "), "]"), more, " },\n", sep = "")
cat("{\n  \"version\": \"", R.version.string, "\",\n", sep = "")
one("temperature", tem, paste0(", \"degreesOfFreedom\": ", num(as.numeric(nu))))
one("selectivity", sel)
one("loss", loss)
cat("  \"meanApart\": ", num(apart), ",\n  \"meanClose\": ", num(close), "\n}\n", sep = "")
