# Reference values for analytics/stats/single_change.hpp, by R's strucchange on
# R's own data set Nile (yearly flow at Aswan, 1871 to 1970).
#
#     Rscript nile.R     writes nile.csv (year, flow) and nile_breaks.csv
#
# Needs r-base-core and r-cran-strucchange.
suppressPackageStartupMessages(library(strucchange))
write.table(data.frame(year = 1871:1970, flow = as.numeric(Nile)), "nile.csv",
            sep = ",", row.names = FALSE, quote = FALSE)
breaks <- breakpoints(Nile ~ 1, h = 15)
bics <- summary(breaks)$RSS["BIC", ]  # by number of breaks: 0, 1, ...
breaks <- breakpoints(breaks, breaks = 1)
write.table(data.frame(before = breaks$breakpoints,
                       year = breakdates(breaks),
                       bic_level = bics[1], bic_step = bics[2]),
            "nile_breaks.csv", sep = ",", row.names = FALSE, quote = FALSE)
