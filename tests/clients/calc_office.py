"""Opens a workbook in LibreOffice Calc without a window and prints what its cells hold, as JSON.

    python3 calc_office.py WORKBOOK LOCALE VBA FORMULA...

Run by a Python that has the office's `uno`, seldom that of the tests. First the live cells, then those after a change
of an input, what further formulas give, what the macro behind the button leaves, and what the pure functions of the
macro for Excel return.
"""

import json
import os
import signal
import subprocess
import sys
import tempfile
import time
from contextlib import suppress
from pathlib import Path
from typing import Any

import uno

PATIENCE = 120.0  # s
LOAD: dict[str, object] = {
    "Hidden": True,
    "MacroExecutionMode": 4,
    "UpdateDocMode": 3,
}  # macros run, links are followed, unasked
SETTINGS = """<?xml version="1.0" encoding="UTF-8"?>
<oor:items xmlns:oor="http://openoffice.org/2001/registry">
<item oor:path="/org.openoffice.Setup/L10N">
<prop oor:name="ooSetupSystemLocale" oor:op="fuse"><value>{locale}</value></prop></item>
<item oor:path="/org.openoffice.Office.Common/Security/Scripting">
<prop oor:name="SecureURL" oor:op="fuse"><value><it>{folder}</it></value></prop></item>
</oor:items>
"""


def connected(process: "subprocess.Popen[bytes]", pipe: str) -> Any:
    """Return the desktop of an office, once it answers."""
    here = uno.getComponentContext()
    resolver = here.ServiceManager.createInstanceWithContext("com.sun.star.bridge.UnoUrlResolver", here)
    until = time.monotonic() + PATIENCE
    while time.monotonic() < until and process.poll() is None:
        with suppress(uno.getClass("com.sun.star.connection.NoConnectException")):
            context = resolver.resolve(f"uno:pipe,name={pipe};urp;StarOffice.ComponentContext")
            return context.ServiceManager.createInstanceWithContext("com.sun.star.frame.Desktop", context)
        with suppress(subprocess.TimeoutExpired):
            process.wait(0.1)
    sys.exit("the office does not answer")


def properties(values: dict[str, object]) -> tuple[Any, ...]:
    made = []
    for name, value in values.items():
        made.append(uno.createUnoStruct("com.sun.star.beans.PropertyValue"))
        made[-1].Name, made[-1].Value = name, value
    return tuple(made)


def cells(document: Any, sheet: str, area: str) -> list[list[object]]:
    return [list(row) for row in document.Sheets.getByName(sheet).getCellRangeByName(area).getDataArray()]


def told(desktop: Any, workbook: Path, twin: Path, formulas: list[str]) -> dict[str, object]:
    document = desktop.loadComponentFromURL(workbook.as_uri(), "_blank", 0, properties(LOAD))
    live, batch = document.Sheets.getByName("cells"), document.Sheets.getByName("batch")
    found: dict[str, object] = {"live": cells(document, "cells", "A6:H9"), "decimal": comma(document)}
    live.getCellRangeByName("B6").setValue(19.5)
    found["changed"] = cells(document, "cells", "A6:H9")
    found["formulas"] = results(live, formulas)
    form = batch.DrawPage.Forms.getByIndex(0)
    (event,) = form.getScriptEvents(0)
    found["button"] = event.ScriptCode
    began = time.monotonic()
    document.getScriptProvider().getScript(event.ScriptCode).invoke((), (), ())
    found["seconds"] = time.monotonic() - began
    found["status"] = batch.getCellRangeByName("B2").getString()
    found["batch"] = cells(document, "batch", "A4:U204")
    batch.getCellRangeByName("B1").setString(batch.getCellRangeByName("B1").getString().replace("co2", "helum"))
    document.getScriptProvider().getScript(event.ScriptCode).invoke((), (), ())
    found["refused"] = batch.getCellRangeByName("B2").getString()
    found["twin"] = of_the_twin(document, twin)
    document.close(True)
    return found


def results(sheet: Any, formulas: list[str]) -> list[object]:
    """Return what formulas give: a text goes where the formula after it looks for it."""
    answer, number = sheet.getCellRangeByName("H6"), sheet.getCellRangeByName("I6")
    kept = answer.getCellByPosition(0, 0).getFormula()
    found = []
    for formula in formulas:
        area = answer if formula.startswith("=WEBSERVICE") else number
        area.getCellByPosition(0, 0).setFormula(formula)
        found.append(area.getDataArray()[0][0])
    answer.getCellByPosition(0, 0).setFormula(kept)
    number.getCellByPosition(0, 0).setString("")
    return found


def of_the_twin(document: Any, source: Path) -> dict[str, object]:
    """Return what the functions of the macro for Excel make of texts and numbers, in the VBA mode of the office."""
    text = source.read_text().partition("\n")[2]  # without the name of the module
    document.BasicLibraries.getByName("Standard").insertByName("Twin", f"Option VBASupport 1\n{text}")

    def call(name: str, *arguments: object) -> object:
        script = f"vnd.sun.star.script:Standard.Twin.{name}?language=Basic&location=document"
        returned = document.getScriptProvider().getScript(script).invoke(arguments, (), ())[0]
        return list(returned) if isinstance(returned, tuple) else returned

    return {
        "SplitLine": call("SplitLine", 'a,"b,c",,"d ""e"""'),
        "CellText": [call("CellText", each) for each in (1.5, -0.000015, "plain", 'a,"b"')],
        "CellValue": [call("CellValue", each, "flux", False) for each in ("1.5", "-1.5e-05", "")],
    }


def comma(document: Any) -> str:
    """Return how this office writes one and a half."""
    cell = document.Sheets.getByName("cells").getCellRangeByName("J1")
    cell.setValue(1.5)
    text = str(cell.getString())
    cell.setString("")
    return text


def main(workbook: Path, locale: str, twin: Path, formulas: list[str]) -> None:
    with tempfile.TemporaryDirectory() as profile:
        settings = Path(profile) / "user" / "registrymodifications.xcu"
        settings.parent.mkdir()
        settings.write_text(SETTINGS.format(locale=locale, folder=workbook.parent.as_uri()))
        pipe = f"catspaw{Path(profile).name}"
        process = subprocess.Popen(
            [
                "soffice",
                f"-env:UserInstallation={Path(profile).as_uri()}",
                "--headless",
                "--norestore",
                f"--accept=pipe,name={pipe};urp;",
            ],
            stdout=subprocess.DEVNULL,
            stderr=subprocess.DEVNULL,
            start_new_session=True,
        )
        try:
            desktop = connected(process, pipe)
            sys.stdout.write(json.dumps(told(desktop, workbook, twin, formulas)))
            with suppress(uno.getClass("com.sun.star.lang.DisposedException")):
                desktop.terminate()
            process.wait(PATIENCE)
        finally:
            with suppress(ProcessLookupError):
                os.killpg(process.pid, signal.SIGKILL)  # what was started is a script that starts the office
            process.wait()


if __name__ == "__main__":
    main(Path(sys.argv[1]).resolve(), sys.argv[2], Path(sys.argv[3]), sys.argv[4:])
