"""The runtime: fetched whole or not at all; the same answers as on a desktop; no silent end."""

import hashlib
import shutil
import subprocess
import sys

import pytest
from same_answers import check_alike, questions

from conftest import ROOT, load_script, wait_arrays

fetch_runtime = load_script("fetch_runtime.py")

FILES = {"a.wasm": b"good a", "b.whl": b"good b"}
HASHES = {name: hashlib.sha256(content).hexdigest() for name, content in FILES.items()}


def source(name, **changed):
    """A source that gives FILES, with some changed; None: it fails."""
    asked = []

    def get(file, folder):
        asked.append(file)
        content = {**FILES, **changed}[file]
        if content is None:
            raise OSError("no route")
        (folder / file).write_bytes(content)
    return (name, get), asked


def contents(folder):
    return {path.name: path.read_bytes() for path in folder.iterdir()}


def test_fetch_installs_and_a_second_time_does_nothing(tmp_path):
    first, asked = source("one")
    assert fetch_runtime.fetch(tmp_path / "runtime", HASHES, [first]) is True
    assert contents(tmp_path / "runtime") == FILES
    assert fetch_runtime.fetch(tmp_path / "runtime", HASHES, [first]) is False
    assert sorted(asked) == sorted(FILES)


def test_a_corrupted_file_is_named_and_nothing_is_installed(tmp_path):
    bad, _ = source("one", **{"b.whl": b"bad"})
    dead, _ = source("two", **{"b.whl": None})
    with pytest.raises(OSError, match=r"b\.whl: from one its sha256 is \w+, pinned is") as problem:
        fetch_runtime.fetch(tmp_path / "runtime", HASHES, [bad, dead])
    assert "b.whl: two failed: no route" in str(problem.value)
    assert "a.wasm" not in str(problem.value)
    assert list(tmp_path.iterdir()) == []


def test_the_second_source_steps_in(tmp_path):
    bad, _ = source("one", **{"a.wasm": b"bad", "b.whl": None})
    good, _ = source("two")
    assert fetch_runtime.fetch(tmp_path / "runtime", HASHES, [bad, good]) is True
    assert contents(tmp_path / "runtime") == FILES


def test_a_damaged_copy_is_repaired_and_kept_when_it_cannot_be(tmp_path):
    target = tmp_path / "runtime"
    good, asked = source("one")
    fetch_runtime.fetch(target, HASHES, [good])
    (target / "b.whl").write_bytes(b"damaged")
    dead, _ = source("two", **{"b.whl": None})
    with pytest.raises(OSError, match=r"b\.whl"):
        fetch_runtime.fetch(target, HASHES, [dead])
    assert contents(target) == {**FILES, "b.whl": b"damaged"}
    asked.clear()
    assert fetch_runtime.fetch(target, HASHES, [good]) is True
    assert asked == ["b.whl"]
    assert contents(target) == FILES


def test_the_installed_runtime_is_the_pinned_one(site):
    pinned = str(ROOT / "scripts/runtime.sha256")
    checked = subprocess.run(["sha256sum", "--check", "--quiet", pinned],
                             cwd=ROOT / ".cache/runtime", capture_output=True, text=True)
    assert checked.returncode == 0, checked.stdout
    again = subprocess.run([sys.executable, str(ROOT / "scripts/fetch_runtime.py")],
                           capture_output=True, text=True, check=True)
    assert again.stderr == ""


SNAPSHOT = """async (change) => {
    const cache = await caches.open('engine-start');
    const [key] = await cache.keys();
    if (!key) return null;
    const found = await cache.match(key);
    const { headers } = found;
    const bytes = new Uint8Array(await found.arrayBuffer());
    const length = bytes.length;
    if (change === 'foreign') bytes.fill(7, 0, 64);
    const changed = change === 'cut' ? bytes.slice(0, 1e6) : bytes;
    if (change) await cache.put(key, new Response(changed, { headers }));
    return length;
}"""


def test_the_second_start_takes_up_a_snapshot(host, page, monkeypatch):
    """... which answers as the plain start does, and numpy joins it."""
    page.goto(host.url)
    wait_arrays(page)
    assert page.evaluate(SNAPSHOT, None) > 1e7
    assert page.workers[0].evaluate("self.startedFrom") == "nothing"
    check_alike(page, questions(40), "ready", monkeypatch)
    check_alike(page, questions(40), "arrays", monkeypatch)
    page.reload()
    wait_arrays(page)
    assert page.workers[0].evaluate("self.startedFrom") == "snapshot"


@pytest.mark.parametrize("change", ["cut", "foreign"])
def test_a_damaged_snapshot_is_passed_over_and_remade(host, page, change):
    page.goto(host.url)
    wait_arrays(page)
    size = page.evaluate(SNAPSHOT, change)
    page.reload()
    wait_arrays(page)
    assert page.workers[0].evaluate("self.startedFrom") == "nothing"
    assert page.evaluate(SNAPSHOT, None) == size
    page.reload()
    wait_arrays(page)
    assert page.workers[0].evaluate("self.startedFrom") == "snapshot"


def test_a_dead_worker_is_replaced_once(host, page):
    page.goto(host.url)
    wait_arrays(page)
    with page.expect_event("worker"):
        page.workers[0].evaluate("setTimeout(() => { throw new Error('dead'); })")
    wait_arrays(page)
    page.workers[0].evaluate("setTimeout(() => { throw new Error('dead again'); })")
    page.wait_for_selector("html[data-engine=failed]", timeout=20_000)


def test_an_engine_that_cannot_start_says_so(host, page, site, tmp_path):
    shutil.copytree(site, tmp_path / "broken")
    for wheel in (tmp_path / "broken").glob("runtime-*/snowhold-*.whl"):
        wheel.unlink()
    host.switch(tmp_path / "broken")
    page.goto(host.url)
    page.wait_for_selector("html[data-engine=failed]", timeout=60_000)
