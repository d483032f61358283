"""Every planted mistake is found, named and weighed; no sound twin raises a false alarm of high severity."""

from collections import Counter


def found(pair, *, wrong):
    return pair.build(wrong).inspect()


def at(inspection, pair):
    return [f for f in inspection if f.check == pair.check and f.element == pair.element]


def test_the_mistake_is_found_named_and_weighed(pair):
    inspection = found(pair, wrong=True)
    findings = at(inspection, pair)
    assert findings, f"{pair.check} at {pair.element} is not among\n{inspection}"
    assert findings[0].severity.value == pair.severity, str(findings[0])
    assert findings[0].got and findings[0].rule and findings[0].fix


def test_the_sound_twin_raises_no_alarm(pair):
    inspection = found(pair, wrong=False)
    assert inspection.passed, str(inspection)
    worse = [f for f in at(inspection, pair) if f.severity.value == pair.severity]
    assert not worse, str(inspection)


def test_the_corpus_holds_what_was_promised(pairs):
    assert len(pairs) >= 30
    assert len({pair.name for pair in pairs}) == len(pairs)
    assert max(Counter((p.check, p.severity) for p in pairs).values()) <= 4, "one kind of mistake fills the corpus"
