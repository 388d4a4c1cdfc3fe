"""Writes flux.ods: a sheet of live cells, a sheet whose rows a macro sends at once, and the macro.

    make_workbook.py [--url http://host:port] [FILE]

Every number in it is invented. The same bytes come out each time, on any machine.
"""

import argparse
import math
import zipfile
from collections.abc import Iterable, Sequence
from pathlib import Path
from xml.sax.saxutils import escape, quoteattr

HERE = Path(__file__).parent
URL = "http://127.0.0.1:8660"
LONG_AGO = (1980, 1, 1, 0, 0, 0)  # the time of every part of the file
STATIONS = (
    ("Nowhere 1 (invented)", 18.4, 35.1, 7.7, 372.4, 409.1),
    ("Nowhere 2 (invented)", 18.12, 35.08, 6.4, 379.9, 409.6),
    ("Nowhere 3 (invented)", 17.95, 35.02, None, 385.2, 409.8),
    ("Nowhere 4 (invented)", 17.61, 34.87, 4.9, 412.7, 410.2),
)
INPUTS = ("water_temperature", "salinity", "wind_speed", "water_fugacity", "air_fugacity")
LINES = 200  # of the batch
SCRIPT = "vnd.sun.star.script:Standard.Flux.SendRange?language=Basic&location=document"
SPACES = {
    "office": "urn:oasis:names:tc:opendocument:xmlns:office:1.0",
    "style": "urn:oasis:names:tc:opendocument:xmlns:style:1.0",
    "number": "urn:oasis:names:tc:opendocument:xmlns:datastyle:1.0",
    "table": "urn:oasis:names:tc:opendocument:xmlns:table:1.0",
    "text": "urn:oasis:names:tc:opendocument:xmlns:text:1.0",
    "draw": "urn:oasis:names:tc:opendocument:xmlns:drawing:1.0",
    "svg": "urn:oasis:names:tc:opendocument:xmlns:svg-compatible:1.0",
    "fo": "urn:oasis:names:tc:opendocument:xmlns:xsl-fo-compatible:1.0",
    "form": "urn:oasis:names:tc:opendocument:xmlns:form:1.0",
    "script": "urn:oasis:names:tc:opendocument:xmlns:script:1.0",
    "of": "urn:oasis:names:tc:opendocument:xmlns:of:1.2",
    "ooo": "http://openoffice.org/2004/office",
    "xlink": "http://www.w3.org/1999/xlink",
}

Cell = str | float | None


def formula(row: int) -> str:
    """Return the live cell of a row: the address put together from the cells, a decimal comma made a point."""
    parts = "".join(
        f'&"&{name}="&SUBSTITUTE([.{column}{row}];",";".")' for name, column in zip(INPUTS, "BCDEF", strict=True)
    )
    return f'of:=COM.MICROSOFT.WEBSERVICE([.$B$1]&"/v1/flux?form=number&errors=text&gas="&[.$B$2]{parts})'


def number_of(row: int) -> str:
    """Return the cell that reads the number out of the answer, in any office, and stays empty where there is none."""
    return f'of:=IFERROR(NUMBERVALUE([.H{row}];".");"")'


def live_sheet(url: str) -> str:
    rows = [
        line("service", url),
        line("gas", "co2"),
        line("every number here is invented"),
        line(),
        line("station", *INPUTS, "flux [mmol m-2 d-1]", "answer", style="head"),
    ]
    for place, station in enumerate(STATIONS, start=6):
        cells = "".join(cell(value) for value in station)
        rows.append(f"<table:table-row>{cells}{live(number_of(place), 'flux')}{live(formula(place))}</table:table-row>")
    return sheet("cells", rows, widths=("wide", *["medium"] * 6, "wide"))


def batch_sheet(url: str) -> str:
    names = ("station", "water_temperature [degC]", "salinity", "wind_speed [kn]", "air_pressure [hPa]")
    rows = [
        line("address", f"{url}/v1/flux?gas=co2"),
        line("status", "not sent yet: press the button, or run the macro Flux.SendRange; every number is invented"),
        line(),
        line(*names, "water_fugacity [uatm]", "air_fugacity [uatm]", style="head"),
    ]
    for number in range(LINES):
        phase = number / 15
        rows.append(
            line(
                f"Nowhere {number + 1} (invented)",
                round(17.5 + 1.2 * math.sin(phase), 2),
                round(34.9 + 0.2 * math.cos(phase), 2),
                None if number % 40 == 7 else round(15 + 8 * math.sin(2.1 * phase), 1),
                round(1009 + 4 * math.cos(0.7 * phase), 1),
                round(395 + 30 * math.sin(1.3 * phase), 1),
                409.5,
            )
        )
    return sheet("batch", rows, widths=("wide", *["medium"] * 6), before=BUTTON)


BUTTON = (
    '<office:forms form:automatic-focus="false" form:apply-design-mode="false"><form:form form:name="Form">'
    '<form:button form:name="Send" form:control-implementation="ooo:com.sun.star.form.component.CommandButton" '
    'xml:id="send" form:id="send" form:label="Send the range" form:button-type="push"><office:event-listeners>'
    '<script:event-listener script:language="ooo:script" script:event-name="form:performaction" '
    f'xlink:href={quoteattr(SCRIPT)} xlink:type="simple"/></office:event-listeners></form:button></form:form>'
    "</office:forms>"
    '<table:shapes><draw:control draw:control="send" svg:x="0.1cm" svg:y="0.95cm" svg:width="3.5cm" '
    'svg:height="0.45cm"/></table:shapes>'
)


def sheet(name: str, rows: Iterable[str], widths: Sequence[str], before: str = "") -> str:
    columns = "".join(f'<table:table-column table:style-name="{width}"/>' for width in widths)
    return f'<table:table table:name="{name}">{before}{columns}{"".join(rows)}</table:table>'


def line(*cells: Cell, style: str = "") -> str:
    return f"<table:table-row>{''.join(cell(value, style) for value in cells) or cell(None)}</table:table-row>"


def cell(value: Cell, style: str = "") -> str:
    look = f' table:style-name="{style}"' if style else ""
    if value is None:
        return f"<table:table-cell{look}/>"
    if isinstance(value, float):
        return f'<table:table-cell{look} office:value-type="float" office:value="{value!r}"/>'
    text = escape(str(value))
    return f'<table:table-cell{look} office:value-type="string"><text:p>{text}</text:p></table:table-cell>'


def live(text: str, style: str = "") -> str:
    look = f' table:style-name="{style}"' if style else ""
    return f"<table:table-cell{look} table:formula={quoteattr(text)}/>"


def content(url: str) -> str:
    spaces = " ".join(f'xmlns:{name}="{address}"' for name, address in SPACES.items())
    styles = (
        '<number:number-style style:name="N"><number:number number:decimal-places="4" '
        'number:min-decimal-places="4" number:min-integer-digits="1"/></number:number-style>'
        '<style:style style:name="wide" style:family="table-column">'
        '<style:table-column-properties style:column-width="5cm"/></style:style>'
        '<style:style style:name="medium" style:family="table-column">'
        '<style:table-column-properties style:column-width="3.6cm"/></style:style>'
        '<style:style style:name="head" style:family="table-cell">'
        '<style:text-properties fo:font-weight="bold"/></style:style>'
        '<style:style style:name="flux" style:family="table-cell" style:data-style-name="N"/>'
    )
    return (
        f'<?xml version="1.0" encoding="UTF-8"?>\n<office:document-content {spaces} office:version="1.3">'
        f"<office:automatic-styles>{styles}</office:automatic-styles><office:body><office:spreadsheet>"
        f"{live_sheet(url)}{batch_sheet(url)}"
        "</office:spreadsheet></office:body></office:document-content>\n"
    )


def macro_parts() -> dict[str, str]:
    """Return the parts that hold the macro."""
    library = 'xmlns:library="http://openoffice.org/2000/library"'
    script = 'xmlns:script="http://openoffice.org/2000/script"'
    source = escape((HERE / "calc_macro.bas").read_text(encoding="ascii"))
    start = '<?xml version="1.0" encoding="UTF-8"?>\n'
    return {
        "Basic/script-lc.xml": f"{start}<library:libraries {library}>"
        '<library:library library:name="Standard" library:link="false"/></library:libraries>\n',
        "Basic/Standard/script-lb.xml": f'{start}<library:library {library} library:name="Standard" '
        'library:readonly="false" library:passwordprotected="false"><library:element library:name="Flux"/>'
        "</library:library>\n",
        "Basic/Standard/Flux.xml": f'{start}<script:module {script} script:name="Flux" '
        f'script:language="StarBasic">{source}</script:module>\n',
    }


def write(target: Path, url: str = URL) -> None:
    """Write the workbook; nothing is compressed, so that the bytes depend on no library."""
    kind = "application/vnd.oasis.opendocument.spreadsheet"
    parts = {"content.xml": content(url), **macro_parts()}
    listed = "".join(
        f'<manifest:file-entry manifest:full-path="{name}" manifest:media-type="text/xml"/>' for name in parts
    )
    manifest = (
        '<?xml version="1.0" encoding="UTF-8"?>\n<manifest:manifest manifest:version="1.3" '
        'xmlns:manifest="urn:oasis:names:tc:opendocument:xmlns:manifest:1.0">'
        f'<manifest:file-entry manifest:full-path="/" manifest:version="1.3" manifest:media-type="{kind}"/>'
        f"{listed}</manifest:manifest>\n"
    )
    with zipfile.ZipFile(target, "w", zipfile.ZIP_STORED) as archive:
        for name, text in {"mimetype": kind, **parts, "META-INF/manifest.xml": manifest}.items():
            entry = zipfile.ZipInfo(name, LONG_AGO)
            entry.create_system = 3
            archive.writestr(entry, text.encode())


if __name__ == "__main__":
    parser = argparse.ArgumentParser(description="Write the workbook of live cells and the macro.")
    parser.add_argument("file", nargs="?", type=Path, default=HERE / "flux.ods")
    parser.add_argument("--url", default=URL, help="of the service (default: %(default)s)")
    options = parser.parse_args()
    write(options.file, options.url)
