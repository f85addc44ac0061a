# A small client of the service: curl sends, python3 reads the JSON. Sourced by the scripts beside it.
set -eu

here=$(dirname "$0")
url=${BOREWRIGHT_URL:-http://127.0.0.1:4100}
key=${BOREWRIGHT_KEY:?Set it to an API key with the scope calculations:write.}

answer=$(mktemp)
trap 'rm -f "$answer"' EXIT

# post_calculation PATH FILE: leaves the answer in $answer, or tells the problem and ends.
# The key goes in through standard input: an argument could be read in the list of processes.
post_calculation() {
  status=$(printf 'header = "Authorization: Bearer %s"\n' "$key" |
    curl --silent --show-error --config - --header 'Content-Type: application/json' \
      --data-binary "@$2" --output "$answer" --write-out '%{http_code}' "$url$1")
  [ "$status" = 201 ] && return
  python3 -c '
import json, sys
problem = json.load(sys.stdin)
print(sys.argv[1], problem["code"] + ":", problem["detail"])
for error in problem.get("errors", []):
    print(" ", error.get("pointer", ""), error["code"] + ":", error["detail"])
' "$status" <"$answer" >&2
  exit 1
}
