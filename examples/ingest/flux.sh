#!/usr/bin/env bash
# Gets one number, sends a file, and sums it up, with curl; without it, with bash alone:  bash flux.sh [FILE]
# The service is at CATSPAW_URL. CATSPAW_BASH_ALONE=1 leaves curl aside.
set -euo pipefail

url=${CATSPAW_URL:-http://127.0.0.1:8660}
file=${1:-$(dirname "$0")/stations.csv}
answered=$(basename "$file" .csv)_flux.csv

# over_bash ADDRESS [FILE]: GET, or POST of a file, by nothing but bash; prints the body. HTTP/1.0 ends it by closing.
over_bash() {
  local place=${1#http://} host port path status line
  path=/${place#*/} place=${place%%/*}
  host=${place%:*} port=${place##*:}
  [ "$port" != "$host" ] || port=80
  exec 3<>"/dev/tcp/$host/$port"
  if [ $# -gt 1 ]; then
    printf 'POST %s HTTP/1.0\r\nHost: %s\r\nContent-Length: %d\r\n\r\n' "$path" "$place" "$(wc -c <"$2")" >&3
    cat "$2" >&3
  else
    printf 'GET %s HTTP/1.0\r\nHost: %s\r\n\r\n' "$path" "$place" >&3
  fi
  read -r _ status _ <&3
  while IFS= read -r line <&3 && [ "$line" != $'\r' ]; do :; done
  cat <&3
  exec 3<&-
  [ "$status" = 200 ]
}

# --data-binary, not -d, which takes the line ends out; --fail-with-body, not -f, which hides the reason.
over_curl() {
  curl --silent --show-error --fail-with-body --max-time 120 ${2:+--data-binary "@$2"} "$1"
}

ask=over_curl
if [ "${CATSPAW_BASH_ALONE:-}" ] || ! command -v curl >/dev/null; then ask=over_bash; fi

question='gas=co2&water_temperature=18.4&salinity=35.1&wind_speed=15%20kn&water_fugacity=372.4&air_fugacity=409.1&form=number'
echo "one number: $($ask "$url/v1/flux?$question") mmol m-2 d-1"

$ask "$url/v1/flux?gas=co2" "$file" >"$answered.part" || { cat "$answered.part" >&2; rm "$answered.part"; exit 1; }
mv "$answered.part" "$answered"

# A blank would count as zero in awk. The reason is last and may hold commas.
awk -F, -v name="$(basename "$file")" '
  NR == 1 { for (i = 1; i <= NF; i++) if ($i == "flux [mmol m-2 d-1]") place = i; next }
  $place != "" { good++; sum += $place }
  END { printf "%s: %d rows answered, %d with a flux, mean %.4f mmol m-2 d-1\n", name, NR - 1, good, sum / good }
' "$answered"
