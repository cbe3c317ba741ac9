# The reference fits in R, asked line by line on standard input; every answer is one line of JSON.
# load FILE ROWS NUMERIC LEVELS | lmfit | lm | keep | diagnose | apart | peak. Only the fit is timed, not the loading.
input <- file("stdin", "r")
say <- function(...) { cat(sprintf(...), "\n", sep = ""); flush(stdout()) }
X <- y <- frame <- fit <- NULL

load <- function(path, rows, numeric, levels) {
  rows <- as.integer(rows)
  counts <- if (levels == "-") integer(0) else as.integer(strsplit(levels, ",")[[1]])
  file <- file(path, "rb")
  y <<- readBin(file, "double", rows)
  columns <- lapply(seq_len(as.integer(numeric)), function(j) readBin(file, "double", rows))
  codes <- lapply(counts, function(count) as.integer(readBin(file, "double", rows)))
  close(file)
  dummies <- unlist(Map(function(code, count) lapply(seq_len(count - 1), function(level) as.double(code == level)),
    codes, counts), recursive = FALSE)
  X <<- do.call(cbind, c(list(rep(1, rows)), columns, dummies))
  names(columns) <- paste0("x", seq_along(columns))
  choices <- Map(function(code, count) factor(code, levels = seq_len(count) - 1), codes, counts)
  if (length(choices) > 0) names(choices) <- paste0("c", seq_along(choices))
  frame <<- do.call(data.frame, c(list(y = y), columns, choices))
  invisible(gc())
}

timed <- function(work) {
  invisible(gc())
  start <- proc.time()[["elapsed"]]
  t0 <- Sys.time()
  b <- work()
  ms <- 1000 * as.numeric(difftime(Sys.time(), t0, units = "secs"))
  b[is.na(b)] <- 0
  say('{"ms": %.6f, "coefficients": [%s]}', ms, paste(sprintf("%.17g", b), collapse = ", "))
}

# Coefficients that pivoting has left out come back as 0, in the order of the columns.
lmfit <- function() {
  z <- .lm.fit(X, y)
  b <- numeric(ncol(X))
  b[z$pivot[seq_len(z$rank)]] <- z$coefficients[seq_len(z$rank)]
  b
}

diagnose <- function() {
  influence <- lm.influence(fit, do.coef = FALSE)
  s <- sqrt(sum(fit$residuals^2) / fit$df.residual)
  hat <- influence$hat
  standard <- rstandard(fit, infl = influence, sd = s)
  student <- rstudent(fit, infl = influence)
  cook <- cooks.distance(fit, infl = influence, sd = s)
  far <- dffits(fit, infl = influence)
  without <- y - fit$residuals / (1 - hat)
  c(sum(hat), sum(standard), sum(student), sum(cook), sum(far), sum(without), sum(fit$fitted.values))
}

# As one types it: each function finds the influences for itself.
apart <- function() {
  without <- y - fit$residuals / (1 - hatvalues(fit))
  c(sum(rstandard(fit)), sum(rstudent(fit)), sum(cooks.distance(fit)), sum(dffits(fit)), sum(without), sum(fitted(fit)))
}

while (length(line <- readLines(input, 1)) > 0) {
  words <- strsplit(line, " ")[[1]]
  switch(words[1],
    load = { load(words[2], words[3], words[4], words[5]); say('{"r": "%s"}', as.character(getRversion())) },
    lmfit = timed(lmfit),
    lm = timed(function() coef(lm(y ~ ., data = frame))),
    keep = { fit <- lm(y ~ ., data = frame); say('{"kept": true}') },
    diagnose = timed(diagnose),
    apart = timed(apart),
    {
      status <- readLines("/proc/self/status")
      kb <- as.numeric(gsub("[^0-9]", "", grep("^VmHWM", status, value = TRUE)))
      say('{"megabytes": %.1f}', kb / 1024)
    })
}
