"""A person at the page: what it shows, what it asked for, and what it complained of."""

from pathlib import Path
from typing import Any
from urllib.parse import urlsplit

PATIENCE = 30_000  # ms
REFUSED = "status of 4"  # the browser itself notes in its console that a request was refused


class Look:
    """One look at the page in a browser with nothing kept from before."""

    def __init__(self, browser: Any, address: str, scheme: str = "light", width: int = 1280, height: int = 900) -> None:
        self.address = address
        self.context = browser.new_context(color_scheme=scheme, viewport={"width": width, "height": height})
        self.page = self.context.new_page()
        self.page.set_default_timeout(PATIENCE)
        self.complaints: list[str] = []
        self.hosts: set[str] = set()
        self.page.on("console", self._hear)
        self.page.on("pageerror", lambda error: self.complaints.append(str(error)))
        self.context.on("request", self._note)

    def _hear(self, message: Any) -> None:
        if message.type in ("error", "warning") and REFUSED not in message.text:
            self.complaints.append(message.text)

    def _note(self, request: Any) -> None:
        parts = urlsplit(request.url)
        if parts.scheme not in ("data", "blob"):
            self.hosts.add(parts.netloc)

    def open(self, path: str = "/") -> Any:
        self.page.goto(self.address + path)
        self.page.wait_for_load_state("networkidle")
        return self.page

    def value(self, result: str = "flux") -> float:
        """Return a result that stands on the page, all its digits."""
        cell = self.page.wait_for_selector(f'#answer-body:not([aria-busy]) [data-result="{result}"]')
        return float(cell.get_attribute("data-value"))

    def snippet(self, name: str) -> str:
        """Return what is ready to be copied under a name."""
        return str(self.page.wait_for_selector(f'[data-snippet="{name}"]').inner_text())

    def saved(self, button: str, folder: Path) -> Path:
        """Press a button that saves a file; return the file."""
        with self.page.expect_download() as waiting:
            self.page.get_by_role("button", name=button).first.click()
        kept = folder / str(waiting.value.suggested_filename)
        waiting.value.save_as(kept)
        return kept

    def close(self) -> None:
        self.context.close()
