"""The server here says what a good static host says: types, compression, caching, policy."""

import gzip
import http.client
import json
from pathlib import Path
from urllib.parse import urlsplit

import pytest

from conftest import ROOT, Host


def get(host: Host, path: str, **headers: str) -> tuple[int, dict[str, str], bytes]:
    address = urlsplit(host.url)
    connection = http.client.HTTPConnection(address.hostname or "", address.port, timeout=20)
    connection.request("GET", path, headers={k.replace("_", "-"): v for k, v in headers.items()})
    reply = connection.getresponse()
    body = reply.read()
    connection.close()
    return reply.status, {name.lower(): value for name, value in reply.getheaders()}, body


def files(site: Path) -> list[str]:
    return sorted(str(p.relative_to(site)) for p in site.rglob("*") if p.is_file())


# The types of the WHATWG MIME Sniffing and WebAssembly Web API standards and of RFC 9239 for
# scripts; a browser refuses a module script or streams no WebAssembly under another one.
@pytest.mark.parametrize(("pattern", "expected"), [
    ("index.html", "text/html"),
    ("service-worker.js", "text/javascript"),
    ("assets/*.js", "text/javascript"),
    ("assets/*.css", "text/css"),
    ("runtime-*/*.wasm", "application/wasm"),
    ("runtime-*/*.json", "application/json"),
    ("manifest.webmanifest", "application/manifest+json"),
])
def test_types(host, site, pattern, expected):
    found = list(site.glob(pattern))
    assert found, f"the build has no {pattern}"
    for path in found:
        status, headers, _ = get(host, f"/{path.relative_to(site)}")
        assert status == 200
        assert headers["content-type"].split(";")[0] == expected


def test_every_file_carries_policy_and_caching(host, site):
    policy = json.loads((ROOT / "scripts/headers.json").read_text())
    for name in files(site):
        _, headers, body = get(host, f"/{name}")
        assert body == (site / name).read_bytes()
        for header, value in policy.items():
            assert headers[header.lower()] == value
        # Only what carries a hash in its name may be kept without asking again.
        hashed = name.startswith(("assets/", "runtime-"))
        assert ("immutable" in headers["cache-control"]) == hashed
        assert (headers["cache-control"] == "no-cache") == (not hashed)


def test_compression_when_it_is_asked_for(host, site):
    wasm = next(site.glob("runtime-*/pyodide.asm.wasm"))
    path = f"/{wasm.relative_to(site)}"
    _, headers, body = get(host, path, Accept_Encoding="br, gzip")
    assert headers["content-encoding"] == "gzip"
    assert headers["vary"] == "Accept-Encoding"
    assert gzip.decompress(body) == wasm.read_bytes()
    _, headers, body = get(host, path)
    assert "content-encoding" not in headers
    assert body == wasm.read_bytes()


def test_nothing_outside_the_folder(host):
    for path in ("/../runtime.sha256", "/%2e%2e/conftest.py", "/assets/none.js", "//etc/passwd"):
        assert get(host, path)[0] in (301, 404)


def test_policy_allows_no_inline_and_no_outside():
    """Script comes from the app's own files, and nothing else comes or goes anywhere."""
    policy = json.loads((ROOT / "scripts/headers.json").read_text())["Content-Security-Policy"]
    rules = {rule.split()[0]: rule.split()[1:] for rule in policy.split("; ")}
    assert rules["default-src"] == ["'none'"]
    assert rules["script-src"] == ["'self'", "'wasm-unsafe-eval'"]
    assert rules["connect-src"] == ["'self'"]
    assert rules["style-src"] == ["'self'"]
    assert "unsafe-inline" not in policy


def test_page_carries_the_policy_for_hosts_that_set_no_headers(site):
    policy = json.loads((ROOT / "scripts/headers.json").read_text())["Content-Security-Policy"]
    html = (site / "index.html").read_text()
    assert html.count("Content-Security-Policy") == 1
    assert f'content="{policy}"' in html
    assert html.index("Content-Security-Policy") < html.index("<script")
