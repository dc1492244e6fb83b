# Exports the open datasets to open/*.csv.  Run: Rscript generate/export.R   (run from testdata)
suppressMessages({library(MASS);library(boot)})
out <- "open"; dir.create(out, showWarnings=FALSE)
w <- function(d, f) write.csv(d, file.path(out, f), row.names=FALSE, na="", quote=FALSE)
p <- rbind(MASS::Pima.tr, MASS::Pima.te)
w(p[c("glu","bp","bmi","age")], "pima.csv")
ct <- as.data.frame(datasets::crimtab, stringsAsFactors=FALSE)  # Var1 finger cm, Var2 height cm, Freq
ct <- ct[rep(seq_len(nrow(ct)), ct$Freq), ]
w(data.frame(height_cm=ct$Var2, finger_cm=ct$Var1), "crimtab.csv")
data("MathExam14W", package="psychotools")
m <- MathExam14W
w(data.frame(tests=m[["tests"]], nsolved=m[["nsolved"]]), "mathexam.csv")
w(datasets::faithful, "faithful.csv")
w(data.frame(time=MASS::newcomb), "newcomb.csv")
w(boot::cd4, "cd4.csv")
