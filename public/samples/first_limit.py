#!/usr/bin/env python3
"""From files to an upper limit by the API alone. Needs Python 3.9 and nothing else.

    python3 first_limit.py ADDRESS COLLABORATION TOKEN_FILE [FOLDER]

FOLDER holds cooling-table.csv, targets.csv, contrast-curves.csv and companions.csv; it is the folder
of this script unless given. What the service says goes to standard output: the statement of the
limit and one line for each credible level. A refusal ends the script with its reasons and status 1.
"""

import base64
import hashlib
import json
import pathlib
import sys
import time
import urllib.error
import urllib.parse
import urllib.request


class Laboratory:
    """The API of one collaboration."""

    def __init__(self, address, collaboration, token):
        self.root = f"{address}/api/v1/collaborations/{collaboration}"
        self.token = token

    def ask(self, method, path, body=None, headers=None):
        request = urllib.request.Request(f"{self.root}/{path}", method=method, data=body)
        request.add_header("Authorization", f"Bearer {self.token}")
        for name, value in (headers or {}).items():
            request.add_header(name, value)
        while True:
            try:
                with urllib.request.urlopen(request) as answer:
                    return answer.read()
            except urllib.error.HTTPError as refusal:
                if refusal.code in (429, 503):
                    time.sleep(int(refusal.headers.get("Retry-After", "1")))
                    continue
                raise SystemExit(reasons(refusal)) from None

    def get(self, path):
        return json.loads(self.ask("GET", path))

    def post(self, path, data=None):
        body = json.dumps(data or {}).encode()
        return json.loads(self.ask("POST", path, body, {"Content-Type": "application/json"}))

    def upload(self, kind, file, **query):
        """Sends a file with its SHA-256, shows what was read, and stores it."""
        content = file.read_bytes()
        digest = base64.b64encode(hashlib.sha256(content).digest()).decode()
        query = urllib.parse.urlencode({"kind": kind, "name": file.name, **query})
        headers = {"Content-Type": "text/csv", "Repr-Digest": f"sha-256=:{digest}:"}
        read = json.loads(self.ask("POST", f"uploads?{query}", content, headers))
        return self.post(f"uploads/{read['id']}/store")

    def wait(self, path, ready):
        """The answer at a path, once it is ready."""
        while True:
            answer = self.get(path)
            if ready(answer):
                return answer
            time.sleep(0.5)


def reasons(refusal):
    problem = json.loads(refusal.read())
    faults = [
        " ".join(f"{key} {fault[key]}" for key in ("file", "line", "column") if fault.get(key))
        + f": found {fault.get('found')}; expected {fault.get('expected')}"
        for fault in problem.get("errors", [])
    ]
    heading = problem["title"] if faults else problem.get("detail", problem["title"])
    return "\n".join([f"{refusal.code}: {heading}", *faults])


def ended(run):
    status = run["job"]["status"]
    if status in ("failed", "cancelled"):
        raise SystemExit(f"the run ended as {status}: {run['job'].get('error')}")
    return status == "done"


def main(address, collaboration, token_file, folder=None):
    token = pathlib.Path(token_file).read_text().strip()
    folder = pathlib.Path(folder or pathlib.Path(__file__).parent)
    lab = Laboratory(address.rstrip("/"), collaboration, token)

    # A name of its own: a file of the same name would become the next version of another's table.
    name = f"Dotterel {time.time_ns()}"
    title = json.dumps({"title": name})
    lab.upload("cooling-tables", folder / "cooling-table.csv", settings=title)
    tables = lab.get("cooling-tables")["coolingTables"]
    cooling = next(table["id"] for table in tables if table["name"] == name)
    survey = lab.post(
        "surveys",
        {
            "name": name,
            "band": "K",
            "mapSettings": {"cooling": {"kind": "table", "coolingTableId": cooling}},
        },
    )
    for kind in ("targets", "contrast-curves", "companions"):
        stored = lab.upload(kind, folder / f"{kind}.csv", survey=survey["slug"])
        print(stored["report"]["summary"])

    # Maps start by themselves when curves are stored.
    lab.wait(f"surveys/{survey['slug']}", lambda answer: answer["maps"]["waiting"] == 0)

    population = lab.post(
        "populations",
        {
            "name": "Flat in both logarithms",
            "convention": "log",
            "definition": {
                "form": "power-law",
                "massMinMjup": 2,
                "massMaxMjup": 30,
                "semiMajorAxisMinAu": 10,
                "semiMajorAxisMaxAu": 200,
                "massIndex": 0,
                "semiMajorAxisIndex": 0,
            },
        },
    )
    analysis = lab.post(
        "analyses",
        {
            "name": "Dotterel alone",
            "recipe": {
                "surveyIds": [survey["id"]],
                "populationId": population["id"],
                "likelihood": "mean-number",
                "prior": {"law": "uniform", "max": 1},
                "credibleLevel": 0.95,
            },
        },
    )
    run = lab.post(f"analyses/{analysis['key']}/runs")
    answer = lab.wait(f"runs/{run['id']}", ended)
    print(answer["result"]["statement"]["sentence"])
    print(lab.ask("GET", f"runs/{run['id']}/exports/limits.csv").decode(), end="")


if __name__ == "__main__":
    if len(sys.argv) not in (4, 5):
        raise SystemExit(__doc__)
    main(*sys.argv[1:])
