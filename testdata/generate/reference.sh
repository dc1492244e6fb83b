#!/bin/sh
# Makes the check values again. Run from testdata:
#   sh generate/reference.sh            interval/, shape/, worked/, nist/: about 5 minutes
#   sh generate/reference.sh all        open/ and expected/ too: about 8 minutes more
# Needs R and, for python3, NumPy, SciPy and mpmath; "all" also needs the R
# packages boot, MASS, psychotools, nortest, tseries, fBasics, e1071, jsonlite
# and the Python package statsmodels.
set -eu
python=${PYTHON:-/usr/bin/python3}

if [ "${1:-}" = all ]; then
	Rscript generate/export.R
	REFS_RAW=$(mktemp -d)
	export REFS_RAW
	Rscript generate/expected.R
	"$python" generate/expected_scipy.py
	rm -r "$REFS_RAW"
fi
"$python" generate/nist.py
"$python" generate/worked.py
"$python" generate/normality.py
Rscript generate/shape.R
Rscript generate/interval.R
Rscript generate/norms.R
"$python" generate/interval.py
"$python" generate/fullmethod.py
