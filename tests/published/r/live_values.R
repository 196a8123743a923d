# SPDX-License-Identifier: GPL-3.0-or-later
# Answers the questions of the live comparison with R. First argument: the topic. Questions come on standard input, one a line, numbers
# separated by spaces; answers go to standard output, one line each, in 17 digits. A line "missing <package>" says what is not installed.

topic <- commandArgs(trailingOnly = TRUE)[1]

need <- function(package) {
    if (!suppressWarnings(requireNamespace(package, quietly = TRUE))) {
        cat("missing", package, "\n")
        quit(status = 0)
    }
}
say <- function(...) cat(sprintf("%.17g", c(...)), "\n")
questions <- function() lapply(strsplit(readLines(file("stdin")), " ", fixed = TRUE), as.numeric)

# The medcouple as defined, by the ordinary median of the whole kernel, with the tie rule of Brys, Hubert & Struyf (2004).
kernelMedian <- function(x) {
    z <- sort(x) - median(x)
    above <- rev(z[z >= 0])
    below <- rev(z[z <= 0])
    k <- sum(z == 0)
    h <- outer(seq_along(above), seq_along(below), function(i, j) {
        a <- above[i]
        b <- below[j]
        ifelse(a == 0 & b == 0, sign(k - (i - (length(above) - k)) - j + 1), (a + b) / (a - b))
    })
    median(h)
}

# Unbiased probability-weighted moments, Hosking (1990).
lSkewness <- function(x) {
    x <- sort(x)
    n <- length(x)
    j <- seq_len(n)
    b0 <- mean(x)
    b1 <- sum((j - 1) / (n - 1) * x) / n
    b2 <- sum((j - 1) * (j - 2) / ((n - 1) * (n - 2)) * x) / n
    (6 * b2 - 6 * b1 + b0) / (2 * b1 - b0)
}

# Question: alpha beta floor highest N. Answer: expected least of N draws from the beta distribution stretched to [floor, highest].
fitted <- function(q) {
    survives <- function(u) pbeta(u, q[1], q[2], lower.tail = FALSE)^q[5]
    # Split where the integrand falls, so that integrate() cannot miss it.
    falls <- qbeta(1 - c(1 - 1e-12, 0.999, 0.9, 0.5, 0.1, 1e-3, 1e-12)^(1 / q[5]), q[1], q[2])
    at <- unique(c(0, falls, 1))
    parts <- mapply(function(from, to) integrate(survives, from, to, rel.tol = 1e-12, subdivisions = 5000L)$value, head(at, -1), tail(at, -1))
    q[3] + (q[4] - q[3]) * sum(parts)
}

# Question: alpha beta floor highest N p. Answer: the p quantile of the least of N draws.
quantileOfLeast <- function(q) q[3] + (q[4] - q[3]) * qbeta(-expm1(log1p(-q[6]) / q[5]), q[1], q[2])

# Question: n T G, then n each of p, v, lo, hi, c, w; T or G is NaN where there is none. Minimise sum v (x - p)^2 under order, bounds,
# sum c x = T and sum w x <= G, by quadprog's solve.QP. Answer: 0 and the cost, or 1 when the constraints are inconsistent. Units that cannot
# move (lo = hi) are put into the constraints as numbers, since a dual method trips over pairs of bounds that leave no room.
chainProblem <- function(q) {
    n <- q[1]
    part <- function(k) q[3 + (k - 1) * n + seq_len(n)]
    v <- part(2)
    base <- mean(part(1))
    p <- part(1) - base
    lo <- part(3) - base
    hi <- part(4) - base
    rows <- rbind(if (n > 1) cbind(-diag(n - 1), 0) + cbind(0, diag(n - 1)), diag(n), -diag(n))
    least <- c(rep(0, n - 1), lo, -hi)
    if (!is.nan(q[3])) {
        rows <- rbind(-part(6), rows)
        least <- c(-(q[3] - base * sum(part(6))), least)
    }
    equal <- !is.nan(q[2])
    if (equal) {
        rows <- rbind(part(5), rows)
        least <- c(q[2] - base * sum(part(5)), least)
    }
    free <- lo < hi
    least <- least - drop(rows[, !free, drop = FALSE] %*% lo[!free])
    rows <- rows[, free, drop = FALSE]
    about <- rowSums(abs(rows)) > 0
    if (any(least[!about] > 1e-7) || (equal && !about[1] && abs(least[1]) > 1e-7)) return(c(1, 0))
    cost <- sum((v * (lo - p)^2)[!free])
    if (!any(free)) return(c(0, cost))
    solved <- tryCatch(
        quadprog::solve.QP(2 * diag(v[free], sum(free)), 2 * (v * p)[free], t(rows[about, , drop = FALSE]), least[about],
                           meq = if (equal && about[1]) 1 else 0),
        error = function(e) if (grepl("inconsistent", conditionMessage(e))) NULL else stop(e))
    if (is.null(solved)) return(c(1, 0))
    c(0, cost + sum((v * (replace(lo, free, solved$solution) - p)^2)[free]))
}

if (topic == "fitted") {
    for (q in questions()) say(fitted(q))
} else if (topic == "quantile") {
    for (q in questions()) say(quantileOfLeast(q))
} else if (topic == "survival") { # alpha beta u
    for (q in questions()) say(pbeta(q[3], q[1], q[2], lower.tail = FALSE))
} else if (topic == "skewness") { # x1 x2 ...: types 1 and 2, the kernel's median, L-skewness
    need("e1071")
    for (x in questions()) say(e1071::skewness(x, type = 1), e1071::skewness(x, type = 2), kernelMedian(x), lSkewness(x))
} else if (topic == "medcouple") { # robustbase averages mc(x) and -mc(-x) up to 100 values, which is the ordinary median of the kernel
    need("robustbase")
    for (x in questions()) say(robustbase::mc(x, doScale = FALSE))
} else if (topic == "datasets") { # no questions: n, the values, then as for skewness
    need("e1071")
    for (x in list(faithful$eruptions, faithful$waiting, as.numeric(precip), mtcars$mpg, mtcars$hp, as.numeric(islands), as.numeric(rivers),
                   cars$dist, sleep$extra, trees$Volume, warpbreaks$breaks, stack.loss, quakes$mag, chickwts$weight, PlantGrowth$weight))
        say(length(x), x, e1071::skewness(x, type = 1), e1071::skewness(x, type = 2), kernelMedian(x), lSkewness(x))
} else if (topic == "remainder") { # M k: odds of the rungs 1..M
    for (q in questions()) say(choose(q[1] - seq_len(q[1]), q[2] - 1) / choose(q[1], q[2]))
} else if (topic == "hypergeometric") { # M k i: none of the i lowest of M among the k left
    for (q in questions()) say(dhyper(0, q[3], q[1] - q[3], q[2]))
} else if (topic == "chain") {
    need("quadprog")
    for (q in questions()) say(chainProblem(q))
} else if (topic == "lmoments") { # alpha beta: L-moments of the beta distribution from their definition: mean, l2, l3 / l2
    for (q in questions()) {
        moment <- function(f) integrate(function(u) qbeta(u, q[1], q[2]) * f(u), 0, 1, rel.tol = 1e-10, subdivisions = 5000L)$value
        l2 <- moment(function(u) 2 * u - 1)
        say(moment(function(u) u^0), l2, moment(function(u) 6 * u^2 - 6 * u + 1) / l2)
    }
} else if (topic == "betaladder") { # alpha beta floor top m: the rungs of a beta quantile ladder
    for (q in questions()) say(q[3] + (q[4] - q[3]) * qbeta((seq_len(q[5]) - 1) / (q[5] - 1), q[1], q[2]))
}
