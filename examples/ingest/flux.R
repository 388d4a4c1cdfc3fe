# Gets one number, sends a file, and sums it up, with base R and curl:  Rscript flux.R [FILE]
# The service is at CATSPAW_URL.
url <- Sys.getenv("CATSPAW_URL", "http://127.0.0.1:8660")
given <- commandArgs(trailingOnly = TRUE)
here <- dirname(sub("^--file=", "", grep("^--file=", commandArgs(), value = TRUE)))
file <- if (length(given)) given[1] else file.path(here, "stations.csv")

# One number. Anything unusual in a value goes through URLencode(value, reserved = TRUE).
question <- paste0(
  "gas=co2&water_temperature=18.4&salinity=35.1&wind_speed=", URLencode("15 kn", reserved = TRUE),
  "&water_fugacity=372.4&air_fugacity=409.1&form=number"
)
number <- as.numeric(readLines(paste0(url, "/v1/flux?", question), warn = FALSE))
cat(sprintf("one number: %.17g mmol m-2 d-1\n", number))

# A file. R alone does not show what is wrong with a refused request; curl does.
answered <- sub("\\.csv$", "_flux.csv", basename(file))
status <- system2("curl", shQuote(c(
  "--silent", "--show-error", "--fail-with-body", "--data-binary", paste0("@", file), "--output", answered,
  paste0(url, "/v1/flux?gas=co2")
)))
if (status != 0) {
  said <- if (file.exists(answered)) readLines(answered, warn = FALSE) else "no answer"
  unlink(answered)
  stop(paste(said, collapse = "\n"), call. = FALSE)
}
table <- read.csv(answered, check.names = FALSE)
flux <- table[["flux [mmol m-2 d-1]"]]
cat(sprintf(
  "%s: %d rows answered, %d with a flux, mean %.4f mmol m-2 d-1\n",
  basename(file), nrow(table), sum(!is.na(flux)), mean(flux, na.rm = TRUE)
))
