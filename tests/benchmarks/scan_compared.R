# SPDX-License-Identifier: GPL-3.0-or-later
# Do two worklists agree? Rscript scan_compared.R SCAN.csv R.csv TIERS. Units on offer exactly; the rest to 1e-9 of its size, since the
# two sum in different orders (and g1 of a nearly even ladder is a difference of large numbers, so it is compared with 1 at least).
ours <- read.csv(commandArgs(TRUE)[1], encoding = "UTF-8", check.names = FALSE)
theirs <- read.csv(commandArgs(TRUE)[2], encoding = "UTF-8")
stopifnot(nrow(ours) == as.integer(commandArgs(TRUE)[3]), nrow(theirs) == nrow(ours))
key <- function(d) paste(d$site, d$tier, sep = "\r")
stopifnot(!anyDuplicated(key(ours)), setequal(key(ours), key(theirs)))
# Both run from worst to best.
share <- function(d) d$gap_share[!is.na(d$gap_share)]
stopifnot(all(diff(share(ours)) <= 0), all(diff(share(theirs)) <= 0))
theirs <- theirs[match(key(ours), key(theirs)), ]
stopifnot(identical(as.integer(ours$on_offer), as.integer(theirs$on_offer)))
worst <- 0
for (column in c("advertised_floor", "expected_cheapest", "gap", "gap_share", "skew_moment")) {
    a <- ours[[column]]
    b <- theirs[[column]]
    # A gap of 0 is a difference of two prices: its error is measured by them.
    size <- switch(column, gap = ours$advertised_floor, gap_share = 1, skew_moment = pmax(1, abs(a)), abs(a))
    stopifnot(identical(is.na(a), is.na(b)))
    apart <- max(abs(a - b) / size, na.rm = TRUE)
    if (apart > 1e-9) stop(column, " differs by ", apart)
    worst <- max(worst, apart)
}
cat(sprintf('{"benchmark": "scan_against_data_table", "agree": {"tiers": %d, "with_units_on_offer": %d, "greatest_relative_difference": %.2g}}\n',
            nrow(ours), sum(ours$on_offer > 0), worst))
