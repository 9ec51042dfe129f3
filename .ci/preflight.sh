#!/usr/bin/env bash
# Outside checkers over finished reports: syntax (qpdf), tags and fonts (poppler), archive rules (PDFBox Preflight). Installs nothing.
# Preflight knows PDF/A-1b only. On our PDF/A-3a it must report what part 3 allows and part 1 does not, and nothing else:
# 1.2.9 and 1.4.7 attachments, 3.1.11 no CIDSet, 4.1.2 opacity, 7.11.2 the number of the part.
set -euo pipefail

allowed='^(1\.2\.9|1\.4\.7|3\.1\.11|4\.1\.2|7\.11\.2)$'
jars=/usr/share/java
classpath=$jars/preflight.jar:$jars/pdfbox2.jar:$jars/fontbox2.jar:$jars/xmpbox.jar:$jars/commons-logging.jar:$jars/javax.activation.jar:$jars/jaxb-api.jar

if [ $# -eq 0 ]; then
  echo "usage: preflight.sh FILE…" >&2
  exit 2
fi
for tool in qpdf pdfinfo pdffonts java; do
  if ! command -v "$tool" >/dev/null 2>&1; then
    echo "preflight: $tool is missing; see .ci/run for the packages" >&2
    exit 2
  fi
done
for jar in ${classpath//:/ }; do
  if [ ! -e "$jar" ]; then
    echo "preflight: $jar is missing; see .ci/run for the packages" >&2
    exit 2
  fi
done

failed=0
complain() {
  echo "$1" >&2
  failed=1
}

for file in "$@"; do
  if [ ! -f "$file" ]; then
    complain "$file: no such file"
    continue
  fi
  qpdf --check "$file" >/dev/null || complain "$file: qpdf finds errors"

  information=$(pdfinfo "$file" || true)
  grep -q '^Tagged: *yes$' <<<"$information" || complain "$file: not tagged"
  grep -q '^Title: *[^ ]' <<<"$information" || complain "$file: no title"

  # Last columns: embedded, subset, Unicode map, object number and generation.
  fonts=$(pdffonts "$file" | tail -n +3 || true)
  [ -n "$fonts" ] || complain "$file: no fonts"
  bad=$(awk '{ if ($(NF-4) != "yes" || $(NF-2) != "yes") print $1 }' <<<"$fonts")
  [ -z "$bad" ] || complain "$file: fonts not embedded or without Unicode map: $bad"

  report=$(java -cp "$classpath" org.apache.pdfbox.preflight.Validator_A1b "$file" 2>&1 || true)
  if ! grep -Eq 'is (not )?a valid PDF/A-1b' <<<"$report"; then
    complain "$file: Preflight gives no verdict"
    echo "$report" | head -n 20 >&2
  fi
  codes=$(grep -Eo '^[[:space:]]*[0-9]+(\.[0-9]+)+ ?:' <<<"$report" | tr -d ' :\t' | sort -u || true)
  for code in $codes; do
    if ! [[ $code =~ $allowed ]]; then
      complain "$file: Preflight reports $code"
      grep -E "^[[:space:]]*${code//./\\.} ?:" <<<"$report" | sort | uniq -c | head -n 5 >&2
    fi
  done
  [ "$failed" -ne 0 ] || echo "$file: qpdf, tags, fonts and Preflight without complaint"
done
exit "$failed"
