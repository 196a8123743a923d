# SPDX-License-Identifier: GPL-3.0-or-later
# The worklist's main figures by R's data.table: units on offer, expected cheapest under the perceived model (as many draws as units on
# offer), gap, gap share and g1 of every tier, worst first. All in vectors, and grouped only by sums that data.table optimizes.
# Rscript scan_against_data_table.R LIST.csv OUT.csv   prints the seconds from when R and the package stand ready to when OUT.csv is written.
suppressPackageStartupMessages(library(data.table))
setDTthreads(2)
arguments <- commandArgs(TRUE)
begin <- proc.time()[["elapsed"]]

units <- fread(arguments[1], select = c("site", "tier", "asking_price", "status", "advertised_floor"), encoding = "UTF-8",
               showProgress = FALSE)
tiers <- units[, .(floor = max(advertised_floor, na.rm = TRUE)), by = .(site, tier)]
vacant <- units[status == "vacant", .(site, tier, price = asking_price)]
rm(units)
setorder(vacant, site, tier, price)
figures <- vacant[, .(on_offer = .N, lowest = min(price), mean = mean(price)), by = .(site, tier)]

m <- rep(figures$on_offer, figures$on_offer)
i <- sequence(figures$on_offer)
above <- vacant$price - rep(figures$lowest, figures$on_offer)
odds <- ((m - i + 1) / m)^m - ((m - i) / m)^m
d <- vacant$price - rep(figures$mean, figures$on_offer)
group <- rep.int(seq_along(figures$on_offer), figures$on_offer)
sums <- data.table(group, w = odds * above, d2 = d * d, d3 = d * d * d)[, .(w = sum(w), d2 = sum(d2), d3 = sum(d3)), by = group]
figures[, `:=`(expected_cheapest = lowest + sums$w, skew_moment = (sums$d3 / on_offer) / (sums$d2 / on_offer)^1.5)]

worklist <- figures[tiers, on = .(site, tier), .(site, tier, on_offer, advertised_floor = floor, expected_cheapest, skew_moment)]
worklist[is.na(on_offer), on_offer := 0L]
worklist[, gap := expected_cheapest - advertised_floor]
worklist[, gap_share := gap / advertised_floor]
setorder(worklist, -gap_share, na.last = TRUE)
fwrite(worklist, arguments[2])

cat(proc.time()[["elapsed"]] - begin, "\n")
