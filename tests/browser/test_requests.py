"""Nothing leaves the origin, and nothing from outside runs."""

from urllib.parse import urlsplit

from conftest import wait_arrays, wait_offline, wait_ready

OUTSIDE = "http://203.0.113.1/"  # an address for documentation, RFC 5737


def test_no_request_leaves_the_origin(host, phone):
    requests: list[str] = []
    phone.on("request", lambda request: requests.append(request.url))
    page = phone.new_page()
    page.goto(host.url)
    wait_arrays(page)
    wait_offline(page)
    page.reload()  # now through the service worker
    wait_arrays(page)
    origin = urlsplit(host.url).netloc
    outside = [url for url in requests
               if urlsplit(url).scheme not in ("data", "blob") and urlsplit(url).netloc != origin]
    assert outside == []
    # Seen were the page's own, the worker's and the service worker's requests.
    names = [urlsplit(url).path for url in requests]
    assert any(name.startswith("/assets/engine-") for name in names)
    assert any(name.endswith(".wasm") for name in names)
    assert names.count("/index.html") >= 1, "the service worker's own requests are not seen"


def test_page_and_worker_can_reach_nothing_outside(host, page):
    page.goto(host.url)
    wait_ready(page)
    attempt = f"fetch('{OUTSIDE}').then(() => 'reached', (problem) => problem.name)"
    blocked = """new Promise((resolve) => self.addEventListener('securitypolicyviolation',
        (event) => resolve(event.effectiveDirective)))"""
    for place in (page, page.workers[0]):
        what = place.evaluate(f"Promise.all([{blocked}, {attempt}])")
        assert what == ["connect-src", "TypeError"]


def test_string_evaluation_is_blocked(host, page):
    page.goto(host.url)
    wait_ready(page)
    # In a task of its own: what the test tool itself evaluates is exempt.
    attempt = """() => new Promise((resolve) => setTimeout(() => {
        try { resolve(new Function('return 1')()); } catch (error) { resolve(error.name); }
    }))"""
    assert page.evaluate(attempt) == "EvalError"
    assert page.workers[0].evaluate(attempt) == "EvalError"


def test_inline_script_is_blocked(host, page):
    page.goto(host.url)
    ran = page.evaluate("""() => {
        const script = document.createElement('script');
        script.textContent = 'window.ran = true';
        document.body.append(script);
        return window.ran === true;
    }""")
    assert ran is False


def test_page_is_quiet(host, page):
    """No error, no warning, no policy violation on the console."""
    said: list[str] = []
    page.on("console", lambda message: said.append(message.text))
    page.on("pageerror", lambda error: said.append(str(error)))
    page.goto(host.url)
    wait_arrays(page)
    wait_offline(page)
    assert said == []
