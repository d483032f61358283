"""The README's forms, run as they stand there."""

import doctest
from pathlib import Path

README = Path(__file__).parents[2] / "README.md"


def test_the_forms_of_the_readme():
    text = README.read_text(encoding="utf-8").split("```pycon\n")[1].split("```")[0]
    found = doctest.DocTestParser().get_doctest(text, {}, "README", str(README), 0)
    assert len(found.examples) > 10
    outcome = doctest.DocTestRunner().run(found)
    assert outcome.failed == 0
