"""Answers are kept up to a number of bytes, whoever asks, and forgotten when told to."""

from concurrent.futures import ThreadPoolExecutor

import pytest

import fastaxis as fa
from fastaxis.engines import memory
from fastaxis.engines.memory import LIGHT, MEMORIES, UP_TO, Memory


@pytest.fixture(autouse=True)
def as_it_was(monkeypatch):
    monkeypatch.setattr(memory, "MEMORIES", list(MEMORIES))
    yield
    fa.remember_light(up_to=UP_TO)


@pytest.fixture
def small():
    kept = Memory(1.0)
    kept.share_in(100)
    return kept


def test_the_longest_unused_goes_first(small):
    for name in "abcd":
        small.put(name, name.upper(), 25)
    assert small.get("a") == "A"
    small.put("e", "E", 25)
    assert [name for name in "abcde" if name in small] == ["a", "c", "d", "e"]
    assert (len(small), small.size) == (4, 100)


def test_one_answer_takes_a_quarter_at_most(small):
    small.put("a", "A", 26)
    assert "a" not in small
    small.put("b", "B", 25)
    small.put("b", "too large now", 26)
    assert small.get("b") is None
    assert small.size == 0


def test_an_answer_in_place_of_another_takes_its_room(small):
    for size in (25, 10, 20):
        small.put("a", size, size)
    assert (small.get("a"), small.size) == (20, 20)


def test_less_room_forgets_at_once(small):
    for name in "abcd":
        small.put(name, name, 25)
    small.share_in(50)
    assert (len(small), small.size) == (2, 50)
    small.share_in(0)
    small.put("e", "e", 1)
    small.put("f", "f", 0)
    assert len(small) == 0


def test_what_is_small_can_stay_where_room_is_made(small):
    small.put("large", "L", 25)
    small.put("small", "S", 10)
    small.clear(over=10)
    assert [name for name in ("large", "small") if name in small] == ["small"]
    assert small.size == 10
    small.clear()
    assert (len(small), small.size) == (0, 0)


def test_all_memories_together_keep_no_more_than_is_asked():
    fa.remember_light(up_to=1 << 20)
    assert sum(one.limit for one in MEMORIES) <= 1 << 20
    assert LIGHT.limit == 3 << 18
    LIGHT.put("a", "a", 1)
    fa.forget_light()
    assert len(LIGHT) == LIGHT.size == 0


@pytest.mark.parametrize("up_to", [-1, 1.5, True, "256 MB"])
def test_bytes_are_a_whole_number(up_to):
    with pytest.raises(fa.ParameterError, match="whole number of bytes") as told:
        fa.remember_light(up_to=up_to)
    exec(told.value.fix, {"fa": fa})
    assert sum(one.limit for one in MEMORIES) <= UP_TO


def test_threads_keep_the_count(small):
    def work(start):
        for i in range(start, start + 300):
            small.put(i % 37, i, 1 + i % 11)
            small.get((i * 7) % 37)

    with ThreadPoolExecutor(4) as pool:
        list(pool.map(work, range(4)))
    assert small.size == sum(size for _, size in small._kept.values()) <= 100


def test_a_lock_held_while_the_process_is_forked_does_not_last(small):
    with small._lock:
        small.unlock()
        with ThreadPoolExecutor(1) as pool:
            pool.submit(small.put, "a", "A", 1).result(timeout=5)
    assert small.get("a") == "A"


def test_an_answer_that_was_being_kept_when_the_process_was_forked_is_counted_once(small):
    small.put("a", "A", 20)
    small.size -= 20  # where the fork met the thread
    small.unlock()
    assert small.size == 20
