"""axe-core on a page, in each of its looks."""

from __future__ import annotations

import re

from playwright.sync_api import Page, expect

from conftest import ROOT

AXE = (ROOT / "web/node_modules/axe-core/axe.min.js").read_text("utf-8")
LOOKS = ("light", "dark", "glare")


def look_like(page: Page, look: str) -> None:
    page.get_by_role("button", name=re.compile("^Settings")).click()
    page.get_by_role("radio", name=look).check()
    page.keyboard.press("Escape")
    expect(page.locator("html")).to_have_attribute("data-look", look)


def violations(page: Page, *extra: str) -> list[str]:
    """What axe-core finds, by rule and element; ``extra``: rules that are off by default."""
    page.evaluate(f"() => {{ if (!window.axe) {{ {AXE} }} }}")
    found = page.evaluate("""async (extra) => (await axe.run(document, {
        rules: Object.fromEntries(extra.map((rule) => [rule, { enabled: true }])),
    })).violations""", list(extra))
    return [f"{one['id']}: {node['target']} {node['failureSummary']}"
            for one in found for node in one["nodes"]]
