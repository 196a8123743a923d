# SPDX-License-Identifier: GPL-3.0-or-later
# Times quadprog's solve.QP on the ladders of least_change_speed, without price points:
#   build/swift/tests/benchmarks/least_change_speed --problems | Rscript --vanilla tests/benchmarks/least_change_quadprog.R
# One line of JSON; milliseconds. The time is that of solve.QP alone, its matrices made beforehand. Costs are compared first.

if (!suppressWarnings(requireNamespace("quadprog", quietly = TRUE))) stop("R's package quadprog is not installed (r-cran-quadprog)")
results <- character()
input <- file("stdin")
lines <- readLines(input)
close(input)
for (line in strsplit(lines, " ", fixed = TRUE)) {
    q <- as.numeric(line)
    n <- q[1]
    part <- function(k) q[3 + (k - 1) * n + seq_len(n)]
    base <- mean(part(1))
    p <- part(1) - base
    v <- part(2)
    lo <- part(3) - base
    hi <- part(4) - base
    free <- lo < hi
    rows <- rbind(part(5), -part(6), cbind(-diag(n - 1), 0) + cbind(0, diag(n - 1)), diag(n), -diag(n))
    least <- c(q[2] - base * sum(part(5)), -(q[3] - base * sum(part(6))), rep(0, n - 1), lo, -hi)
    least <- least - drop(rows[, !free] %*% lo[!free])
    rows <- t(rows[, free])
    about <- colSums(abs(rows)) > 0
    rows <- rows[, about]
    least <- least[about]
    D <- 2 * diag(v[free])
    d <- 2 * (v * p)[free]
    times <- numeric()
    repeats <- max(1, round(4e7 / n^3)) # So that the clock's hundredths do not matter for the small ones.
    for (run in 1:3) {
        gc()
        elapsed <- system.time(for (i in seq_len(repeats)) x <- quadprog::solve.QP(D, d, rows, least, meq = 1)$solution)[["elapsed"]]
        times[run] <- elapsed / repeats
    }
    cost <- sum(v[free] * (x - p[free])^2)
    ours <- q[length(q)]
    if (abs(cost - ours) > 1e-8 * cost) stop(sprintf("%d units: quadprog's cost is %.17g, the solver's %.17g", n, cost, ours))
    results <- c(results, sprintf('{"units": %d, "median": %.3f}', n, 1000 * median(times)))
}
cat('{"benchmark": "quadprog", "unit": "milliseconds", "solve": [', paste(results, collapse = ", "), "]}\n", sep = "")
