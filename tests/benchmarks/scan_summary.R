# SPDX-License-Identifier: GPL-3.0-or-later
# Medians out of what scan_against_data_table.sh measured, in the folder it measured in.
times <- function(file) {
    t <- setNames(read.table(file), c("wall", "user", "sys", "kb"))
    t$wall <- t$wall / 1e6
    t
}
spread <- function(x) sprintf('{"median": %.3f, "least": %.3f, "greatest": %.3f}', median(x), min(x), max(x))
scan <- times("scan.times")
r <- times("r.times")
inner <- read.table("r.inner")[[1]]
cat(sprintf('{"benchmark": "scan_against_data_table", "units": 1000000, "threads": 2, "rounds": %d,\n "scan": {"wall_s": %s, "cpu_s": %s, "peak_mb": %.1f},\n',
            nrow(scan), spread(scan$wall), spread(scan$user + scan$sys), median(scan$kb) / 1024))
cat(sprintf(' "data_table": {"wall_s": %s, "wall_without_start_s": %s, "cpu_s": %s, "peak_mb": %.1f},\n',
            spread(r$wall), spread(inner), spread(r$user + r$sys), median(r$kb) / 1024))
stricter <- min(median(r$wall), median(inner))
time <- median(scan$wall) / stricter
memory <- median(scan$kb) / median(r$kb)
cat(sprintf(' "time_ratio": %.3f, "time_ratio_with_start": %.3f, "memory_ratio": %.3f}\n', time, median(scan$wall) / median(r$wall), memory))
if (time > 0.5 || memory > 1 / 3) {
    cat("scan needs more than half of the time or a third of the memory\n", file = stderr())
    quit(status = 1)
}
