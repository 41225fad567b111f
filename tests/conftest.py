"""The built site, a server that can be stopped, and a browser: what browser tests stand on."""

from __future__ import annotations

import importlib.machinery
import importlib.util
import os
import shutil
import subprocess
from collections.abc import Callable, Iterator
from contextlib import contextmanager
from pathlib import Path
from types import ModuleType
from typing import Any

import pytest
from playwright.sync_api import Browser, BrowserContext, Page, expect, sync_playwright

ROOT = Path(__file__).resolve().parent.parent

# Debian's Chromium, kept from calling home: where only localhost is reachable, its attempts fail
# by the dozen and slow the tests.
CHROMIUM = os.environ.get("CHROMIUM", "/usr/bin/chromium")
FLAGS = [
    "--no-sandbox", "--disable-gpu", "--disable-quic", "--no-first-run",
    "--disable-background-networking", "--disable-component-update", "--disable-sync",
]
PHONE: dict[str, Any] = {
    "viewport": {"width": 412, "height": 915}, "device_scale_factor": 2.625,
    "is_mobile": True, "has_touch": True,
}
START_MS = 60_000
"""How long a start may take on a busy machine before a test calls it hung."""


def load_script(name: str) -> ModuleType:
    """A Python file of scripts/ as a module."""
    loader = importlib.machinery.SourceFileLoader(name, str(ROOT / "scripts" / name))
    spec = importlib.util.spec_from_loader(name, loader)
    assert spec
    module = importlib.util.module_from_spec(spec)
    loader.exec_module(module)
    return module


class Host:
    """A static host on a port of its own, which can go down and come back with other files."""

    def __init__(self, folder: Path) -> None:
        self._make = load_script("serve").Server
        self.folder = folder
        self._port = 0
        self._server: Any = None
        self.start()

    @property
    def url(self) -> str:
        return f"http://localhost:{self._port}/"

    @property
    def sent(self) -> int:
        """Bytes sent since the host came up."""
        return int(self._server.sent)

    def start(self, folder: Path | None = None) -> None:
        """Come up, with another folder if one is given."""
        self.folder = folder or self.folder
        self._server = self._make(self.folder, self._port)
        self._port = self._server.server_address[1]
        self._server.start()

    def stop(self) -> None:
        if self._server:
            self._server.stop()
            self._server = None

    def switch(self, folder: Path) -> None:
        """Serve another folder from the same address."""
        self.stop()
        self.start(folder)


@pytest.fixture(scope="session")
def site(tmp_path_factory: pytest.TempPathFactory) -> Path:
    """The built folder, built first if a source has changed; a copy, so that it stays as it is."""
    subprocess.run([str(ROOT / "scripts/build")], check=True, stdin=subprocess.DEVNULL)
    folder = tmp_path_factory.mktemp("site") / "dist"
    shutil.copytree(ROOT / "web/dist", folder)
    return folder


@pytest.fixture(scope="session")
def next_site(site: Path, tmp_path_factory: pytest.TempPathFactory) -> Path:
    """Another version: its page says so, and its page's and its engine's scripts differ, too."""
    sources = tmp_path_factory.mktemp("next")
    shutil.copytree(ROOT / "web", sources, dirs_exist_ok=True,
                    ignore=shutil.ignore_patterns("node_modules", "dist*"))
    (sources / "node_modules").symlink_to(ROOT / "web/node_modules")
    with (sources / "index.html").open("a") as html:
        html.write('<p id="next-version">The next version.</p>\n')
    with (sources / "app/main.js").open("a") as script:
        script.write("document.documentElement.dataset.version = 'next';\n")
    with (sources / "worker/engine.js").open("a") as script:
        script.write("self.version = 'next';\n")
    subprocess.run(["node", str(ROOT / "scripts/build_site.mjs"), str(sources)], check=True)
    return sources / "dist"


@pytest.fixture
def host(site: Path) -> Iterator[Host]:
    """The built site on a host of its own: an origin that no other test has used."""
    host = Host(site)
    yield host
    host.stop()


@pytest.fixture(scope="session")
def browser() -> Iterator[Browser]:
    # Playwright then reports what a service worker fetches, too.
    os.environ["PW_EXPERIMENTAL_SERVICE_WORKER_NETWORK_EVENTS"] = "1"
    with sync_playwright() as playwright:
        browser = playwright.chromium.launch(executable_path=CHROMIUM, args=FLAGS)
        yield browser
        browser.close()


@pytest.fixture
def new_context(browser: Browser) -> Iterator[Callable[..., BrowserContext]]:
    """Makes browser contexts, each with a storage of its own; takes Playwright's options."""
    made: list[BrowserContext] = []

    def make(**options: Any) -> BrowserContext:
        made.append(browser.new_context(**options))
        return made[-1]

    yield make
    for context in made:
        context.close()


@pytest.fixture
def phone(new_context: Callable[..., BrowserContext]) -> BrowserContext:
    """A phone's browser with nothing stored yet."""
    return new_context(**PHONE)


@pytest.fixture
def page(phone: BrowserContext) -> Page:
    """A blank page on a phone."""
    return phone.new_page()


@contextmanager
def first_visit(context: BrowserContext, url: str) -> Iterator[Page]:
    """A page as on a first visit, nothing kept, not yet opened; it must end without an error."""
    page = context.new_page()
    errors: list[str] = []
    page.on("pageerror", lambda error: errors.append(str(error)))
    page.goto(f"{url}manifest.webmanifest")
    page.evaluate("""() => new Promise((done) => {
        indexedDB.deleteDatabase('keyval-store').onsuccess = done;
    })""")
    yield page
    page.close()
    assert errors == []


def wait_ready(page: Page) -> None:
    """Wait until the engine answers. (The page's policy forbids ``wait_for_function``.)"""
    expect(page.locator("html[data-engine=ready]")).to_have_count(1, timeout=START_MS)


def wait_arrays(page: Page) -> None:
    """Wait until numpy has joined."""
    expect(page.locator("html[data-arrays=ready]")).to_have_count(1, timeout=START_MS)


def wait_offline(page: Page) -> None:
    """Wait until the whole app is on the device."""
    page.evaluate("navigator.serviceWorker.ready.then(() => true)")
