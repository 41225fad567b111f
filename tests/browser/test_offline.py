"""Without a network: cold starts, whole versions, a sub-folder of any host."""

import http.server
import shutil
import threading
from functools import partial
from pathlib import Path

import pytest
from playwright.sync_api import BrowserContext, Page, expect

from conftest import START_MS, wait_arrays, wait_offline, wait_ready


def install(context: BrowserContext, url: str) -> None:
    """A first visit, until the whole app is on the device."""
    page = context.new_page()
    page.goto(url)
    wait_ready(page)
    wait_offline(page)
    page.close()


def verdict(page: Page) -> str:
    shown = page.locator('[data-answer="verdict"]').first
    expect(shown).not_to_be_empty(timeout=START_MS)
    return shown.inner_text()


def test_cold_start_with_the_server_gone(host, phone):
    install(phone, host.url)
    online = phone.new_page()
    online.goto(host.url)
    wait_ready(online)
    expected = verdict(online)
    online.close()

    host.stop()
    phone.set_offline(True)
    page = phone.new_page()
    page.goto(host.url)
    wait_ready(page)
    assert verdict(page) == expected
    wait_arrays(page)


def test_a_shared_link_opens_offline(host, phone):
    install(phone, host.url)
    host.stop()
    page = phone.new_page()
    page.goto(f"{host.url}?from=home#pitch=20")
    wait_ready(page)


def test_first_visit_shows_progress_up_to_the_whole(host, page):
    page.add_init_script("""
        window.progress = [];
        navigator.serviceWorker.addEventListener('message', ({ data }) => {
            if (data?.type === 'precache') window.progress.push(data);
        });
    """)
    page.goto(host.url)
    wait_offline(page)
    seen = page.evaluate("window.progress")
    assert len(seen) > 3
    assert [step["done"] for step in seen] == sorted(step["done"] for step in seen)
    assert seen[-1]["done"] == seen[-1]["total"] > 0


def precached(folder: Path) -> list[str]:
    """Every file of the app but the service worker, which the browser keeps itself."""
    return [str(path.relative_to(folder)) for path in folder.rglob("*")
            if path.is_file() and path.name != "service-worker.js"
            and path.parent.name != "licences"]


def is_next(page: Page) -> tuple[bool, bool]:
    """Whether the page's text and its script are the next version's."""
    return (page.locator("#next-version").count() == 1,
            page.evaluate("document.documentElement.dataset.version === 'next'"))


def update(page: Page) -> None:
    """Look for the next version; until it waits, whole, for its turn, or is given up."""
    page.evaluate("""async () => {
        const registration = await navigator.serviceWorker.getRegistration();
        await registration.update();
        const coming = registration.installing;
        if (coming) await new Promise((resolve) => coming.addEventListener('statechange', resolve));
    }""")


def test_an_update_swaps_whole(host, phone, site, next_site):
    install(phone, host.url)
    page = phone.new_page()
    page.goto(host.url)
    wait_ready(page)
    host.switch(next_site)
    update(page)

    # The open page keeps its version, whole, though the host has it no more: also through a reload
    # and for files that it has not asked for yet.
    assert is_next(page) == (False, False)
    page.reload()
    wait_arrays(page)
    assert is_next(page) == (False, False)
    size_of = "async (path) => (await (await fetch(path)).arrayBuffer()).byteLength"
    for name in precached(site):
        assert page.evaluate(size_of, name) == (site / name).stat().st_size, name
    page.close()

    # The next cold start is the next version, whole, and needs no network.
    host.stop()
    page = phone.new_page()
    page.wait_for_timeout(500)  # the browser hands over once the last old page is gone
    page.goto(host.url)
    wait_arrays(page)
    assert is_next(page) == (True, True)
    assert page.workers[0].evaluate("self.version") == "next"
    # Nothing of the old version is left behind, nor the snapshot of its engine.
    kept = page.evaluate("""async () => {
        const caches_ = await Promise.all((await caches.keys()).map((name) => caches.open(name)));
        const keys = await Promise.all(caches_.map((cache) => cache.keys()));
        return keys.flat().map(({ url }) => new URL(url).pathname.slice(1));
    }""")
    engine = next(next_site.glob("assets/engine-*.js"))
    assert sorted(kept) == sorted([
        *precached(next_site), f"{engine.relative_to(next_site)}.snapshot"])


def test_a_broken_update_is_never_used(host, phone, next_site, tmp_path):
    install(phone, host.url)
    broken = tmp_path / "broken"
    shutil.copytree(next_site, broken)
    script = next(broken.glob("assets/engine-*.js"))
    script.write_bytes(script.read_bytes() + b"//")
    page = phone.new_page()
    page.goto(host.url)
    wait_ready(page)
    host.switch(broken)
    update(page)
    page.close()

    host.stop()
    page = phone.new_page()
    page.wait_for_timeout(500)
    page.goto(host.url)
    wait_ready(page)
    assert is_next(page) == (False, False)
    page.close()

    # Whole at the next try.
    host.start(next_site)
    page = phone.new_page()
    page.goto(host.url)
    wait_ready(page)
    update(page)
    page.close()
    page = phone.new_page()
    page.wait_for_timeout(500)
    page.goto(host.url)
    wait_ready(page)
    assert is_next(page) == (True, True)


@pytest.fixture
def plain_host(site, tmp_path):
    """The site in a sub-folder of a host that sets no headers: Python's own file server."""
    shutil.copytree(site, tmp_path / "some/where")

    class Quiet(http.server.SimpleHTTPRequestHandler):
        def log_message(self, format, *args):
            pass

    server = http.server.ThreadingHTTPServer(("127.0.0.1", 0), partial(Quiet, directory=tmp_path))
    threading.Thread(target=server.serve_forever, daemon=True).start()
    yield server
    server.shutdown()
    server.server_close()


def test_sub_folder_of_a_host_without_headers(plain_host, phone):
    url = f"http://localhost:{plain_host.server_address[1]}/some/where/"
    install(phone, url)
    plain_host.shutdown()
    plain_host.server_close()
    page = phone.new_page()
    page.goto(url)
    wait_ready(page)
    assert verdict(page)
    # The policy that the host did not send, the service worker did, to page and worker alike.
    policies = page.evaluate("""async (paths) => Promise.all(paths.map(async (path) =>
        (await fetch(path)).headers.get('Content-Security-Policy')))""",
        ["./", page.workers[0].url])
    assert all("default-src 'none'" in policy for policy in policies)
