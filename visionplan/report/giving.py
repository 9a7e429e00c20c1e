"""What would have to give: the concessions, and what each line of the brief costs."""

from collections.abc import Mapping

from visionplan.brief.fields import BY_KEY
from visionplan.report.concession import concession_change, concession_sentence
from visionplan.report.remarks import pair
from visionplan.solve.rig import Ranking


def giving(ranking: Ranking, tolls: Mapping[str, int], system: str = "mm") -> str:
    """Concessions and tolls as text.

    Parameters
    ----------
    ranking : Ranking
        With its concessions worked out.
    tolls : mapping
        Line (section.key) → how many more pairs would fit without it.
    system : str
        "mm" or "inch", for lengths.
    """
    return "\n".join([*_concessions(ranking, system), "", *_tolls(tolls), ""])


def _concessions(ranking: Ranking, system: str) -> list[str]:
    if ranking.fitting:
        return [f"{ranking.fitting:,} of {ranking.pairs:,} pairs fit: nothing has to give."]
    if not ranking.concessions:
        return [f"None of {ranking.pairs:,} pairs fits, and no change of one demand alone lets one fit."]
    lines = [f"None of {ranking.pairs:,} pairs fits. Any one of these lets a rig fit, all else as asked:"]
    for concession in ranking.concessions:
        sentence = concession_sentence(ranking.brief, concession, system)
        lines.append(f"  {concession_change(concession):>8}  {sentence}: {pair(concession.camera, concession.lens)}")
    return lines


def _tolls(tolls: Mapping[str, int]) -> list[str]:
    dear = sorted(((count, line) for line, count in tolls.items() if count), key=lambda entry: (-entry[0], entry[1]))
    free = [line for line, count in tolls.items() if not count]
    width = max((len(line) for _, line in dear), default=0)
    lines = ["How many more pairs would fit without a line of the brief:"]
    lines += [f"  {count:>+8,}  {line:<{width}}  {BY_KEY[line].doc}" for count, line in dear]
    if free:
        lines.append(f"  none without {', '.join(free)}")
    return lines
