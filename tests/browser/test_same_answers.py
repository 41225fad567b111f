"""The browser's engine and the desktop's give the same answers, to 1e-12."""

import pytest
from same_answers import any_questions, check_alike, questions

from conftest import wait_ready


@pytest.mark.parametrize("stage", ["ready", "arrays"])
def test_browser_and_desktop_answer_alike(host, page, stage, monkeypatch):
    page.goto(host.url)
    wait_ready(page)
    check_alike(page, questions(200), stage, monkeypatch)


def test_every_topic_answers_alike(host, page, monkeypatch):
    page.goto(host.url)
    wait_ready(page)
    check_alike(page, any_questions(20), "arrays", monkeypatch)
