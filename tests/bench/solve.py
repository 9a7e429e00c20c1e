"""Rank in this process and print, as JSON, what the solve alone took: `python -m tests.bench.solve BRIEF DIR [TOP]`."""

import json
import sys
from time import process_time

from visionplan.brief.read import read_brief
from visionplan.catalogue.folder import read_catalogue
from visionplan.solve import rank

if __name__ == "__main__":
    brief, catalogue = read_brief(sys.argv[1]), read_catalogue(sys.argv[2])
    begin = process_time()
    ranking = rank(brief, catalogue, top=int(sys.argv[3]) if len(sys.argv) > 3 else 20)
    cpu = process_time() - begin
    print(json.dumps({"seconds": ranking.seconds, "cpu": cpu, "pairs": ranking.pairs, "fitting": ranking.fitting}))
