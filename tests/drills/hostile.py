"""Requests that mean harm or come from a broken client, as the bytes that go over the wire; longer because it lists."""

import gzip
import json
import zlib
from typing import Any

from tests.api.questions import FLUX, body, table
from tests.drills.serving import ROW

FLUX_PATH = "/v1/flux"
DEEP = 100_000
ZEROS = bytes(1024 * 1024)


def posted(content: bytes, path: str = FLUX_PATH, headers: str = "") -> bytes:
    """Return a POST of some content."""
    head = f"POST {path} HTTP/1.1\r\nHost: x\r\nConnection: close\r\nContent-Length: {len(content)}\r\n{headers}\r\n"
    return head.encode("latin-1") + content


def got(path: str, headers: str = "", method: str = "GET") -> bytes:
    """Return a request without a body."""
    return f"{method} {path} HTTP/1.1\r\nHost: x\r\nConnection: close\r\n{headers}\r\n".encode("latin-1")


def asked(name: str, value: str) -> bytes:
    """Return a GET of the flux, one of its parameters written as it is here."""
    rest = "&".join(f"{key}={each}" for key, each in FLUX.items() if key != name)
    return got(f"{FLUX_PATH}?{rest}&{name}={value}")


def swollen(pieces: int) -> bytes:
    """Return a mebibyte of zeros so many times, in one gzip member."""
    stream = zlib.compressobj(9, wbits=31)
    return b"".join(stream.compress(ZEROS) for _ in range(pieces)) + stream.flush()


def _json(name: str, value: Any) -> bytes:
    return json.dumps({**FLUX, name: value}).encode()


def _raw(text: str) -> bytes:
    """Return the question with a wind speed written as it is here."""
    return body(wind_speed=7654321).replace(b"7654321", text.encode())


NUMBERS_IN_JSON = ["01", "+1", ".5", "5.", "0x10", "1_0", "1e", "1e999", "-", "Infinity", "-Infinity", "'7'", "9" * 400]
NUMBERS_IN_JSON += [
    "9" * 5000,
    "1" + "0" * 400 + ".0",
    "undefined",
    "7 kn",
    "[7",
    "{7}",
    "[,]",
    "[7,]",
    "7 // no",
    "\u0667",
]
VALUES = ["7", "calm", True, False, [True], [[7]], [[7], [8]], {}, {"values": [7], "unit": "furlong"}, {"value": 7}]
VALUES += [{"values": 7, "units": "kn"}, {"values": [7], "unit": "degC"}, ["7"], [{}], [{"values": 7}], [], [7, True]]
VALUES += [
    {"values": [7], "unit": 5},
    {"values": {"values": 7}},
    ["7 kn", 8],
    "7,5",
    "7;8 kn,",
    "\u0667",
    "x" * 10**6,
]
OTHER_BODIES = [
    b"{}", b"[]", b"[{}]", b"null", b"7", b'"x"', b"true", b"{", b"}", b"[", b'{"gas"', b'{"gas":', b'{"gas":}',
    b"{gas: co2}", b"{'gas': 'co2'}", b'{"gas": "co2",}', b'{"gas": "co2"} {"gas": "co2"}', b'{"gas": "\xff"}',
    b'{"gas": "\\ud800"}', b'{"gas": "co2\x00"}', b'\x00{"gas": "co2"}', body().decode().encode("utf-16"),
    b'{"gas": "co2", "gas": "o2"}', b"[" * DEEP, b'{"a":' * DEEP, b'{"a":' * 900 + b"1" + b"}" * 900,
    b'{"gas": ' + b"[" * 500 + b"]" * 500 + b"}", b"[" + b"{}," * 300_000 + b"{}]", b"{}" * 1000, b"/* */ {}",
    b"<xml/>",
    json.dumps({"n" * 10**6: 1}).encode(), json.dumps({f"name {i}": i for i in range(50_000)}).encode(),
    json.dumps({"__proto__": 1, "constructor": 2}).encode(), _json("gas", "x" * 10**6), _json("gas", 7), _json("gas",
    None),
    _json("gas", ["co2", "o2"]), _json("gas", {"values": ["co2"]}), _json("pick", ["x" * 1000] * 500), _json("pick",
    {}),
    _json("pick", 7), _json("unit", "x" * 10**6), _json("strict", "maybe"), _json("detail", "everything"),
    _json("decimal", "both"), _json("Wind_Speed", 7), _json("wind speed", 7), _json("wind_speed", [7.0] * 100_001),
    body(wind_speed=[7, 8], salinity=[35, 35, 35]), _json("wind_speed", ["calm"] * 100_000),
    _json("wind_speed", "@wind"), _json("u_wind_speed", "much"), _json("water", "soup"), _json("parameterisation",
    "nobody-1900"),
]  # fmt: skip
NAMES = list(table()[: table().index(b"\n")].decode().split(","))
TABLES = [
    b"", b" ", b"\n\n\n", table()[: table().index(b"\n") + 1], b"a\n", b"a,b\n1,2\n", table().replace(b"\n", b""),
    table().replace(b"\n", b"\r"), table().replace(b"salinity", b"Salinity"), table().replace(b"salinity", b"salinty"),
    table().replace(b"salinity", b"wind_speed"), table().replace(b"salinity", b"salinity [furlong]"),
    table().replace(b"salinity", b"salinity [kn]"), table().replace(b"salinity", b"salinity [1"),
    table().replace(b"salinity", b'"salinity'), b'"' + table(), table().decode().encode("utf-16"),
    table().replace(b"salinity", b"salinit\xe9"), table().replace(b"salinity", b"sal\x00inity"), b"\x00" * 1000,
    b"\xff\xfe" + table(), b"\x89PNG\r\n\x1a\n" + bytes(range(256)), b"PK\x03\x04" + bytes(200),
    b"%PDF-1.7\n" + bytes(200),
    table([["x"] * len(NAMES)] * 50), table([["7,5"] * len(NAMES)] * 50, delimiter=";"),
    table([["1_0"] * len(NAMES)] * 50),
    table([["0x10"] * len(NAMES)] * 50), table([["inf"] * len(NAMES)] * 50), table([["\u0667"] * len(NAMES)] * 50),
    table([[*ROW, 1]], [*NAMES, "flux"]), table([[*ROW, 1]], [*NAMES, "flux [mmol m-2 d-1]"]),
    table([[*ROW, 1]], [*NAMES, "quality_flag"]), table([ROW + [1] * 1100], NAMES + [f"c{i}" for i in range(1100)]),
    table([[*ROW, 1]], [*NAMES, "n" * 5000]), b",".join([b"salinity"] * 900) + b"\n" + b",".join([b"1"] * 900) + b"\n",
    b"," * 100_000 + b"\n", b'"' * 100_001, b"salinity\n" * 3, b"--x\r\nno multipart\r\n--x--\r\n",
]  # fmt: skip
CSV_PATH = "/v1/flux?gas=co2"
QUERIES = [
    *(asked("wind_speed", text) for text in (
        "calm", "1_0", "%D9%A7", "0x10", "1e", "--1", "7,5", "7%20kn%20kn", "7%20furlong", "7%20degC", "7;8;x",
        "7;;x", "nan%20nan", "inf", "-inf", "%00", "7%00", "%FF", "@wind", "%u0037",
        "${7*7}", "{{7*7}}", "'%20or%201=1", "<script>", "../../x",
    )),
    *(asked("gas", text) for text in ("", "unobtainium", "CO2;O2", "%00", "co2%0d%0aX-Evil:1", "x" * 4000)),
    got("/v1/flux"), got("/v1/flux?gas=co2&gas=co2"), got("/v1/flux?" + "a=1&" * 1500), got("/v1/flux?" + "x" * 8191),
    got("/v1/flux?form=xml"), got("/v1/flux?form=json&form=csv"), got("/v1/flux?errors=html"), got("/v1/flux?=&=&"),
    got("/v1/flux?gas=co2&salinity=35;36&wind_speed=7;8;9"), got("/v1/flux?gas=co2&unknown=1"), got("/v1/gases?x=1"),
    got("/v1/gases/%00"), got("/v1/gases/..%2f..%2fetc%2fpasswd"), got("/v1/gases/" + "x" * 7000),
    got("/v1/parameterisations?wind_speed=fast"), got("/v1/parameterisations?water=soup"), got("/v1/checks?gas=x"),
    got("/v1//flux"), got("//v1/flux"), got("/v1/../v1/flux/x"), got("/v1/%2e%2e/"), got("/nowhere"),
    got("/v1/" + "a/" * 3000),
    got("/v1/flux", "X-HTTP-Method-Override: DELETE\r\n"), got("/v1/sources?form=xml"), got("/.env"),
    got("/v1/flux%00"),
    *(got(FLUX_PATH, method=method) for method in ("TRACE", "PUT", "DELETE", "PATCH", "FOO", "PROPFIND", "M-SEARCH")),
    got("/v1/gases", method="TRACE"), got("/healthz", method="DELETE"), posted(b"", "/v1/gases"), posted(b"",
    "/healthz"),
]  # fmt: skip
ENCODED = [
    posted(body(), headers=f"Content-Encoding: {name}\r\n")
    for name in ("br", "deflate", "zstd", "compress", "gzip, gzip", "x")
]
ENCODED += [
    posted(content, CSV_PATH, "Content-Encoding: gzip\r\n")
    for content in (
        swollen(1024), swollen(200), gzip.compress(table())[:-1], gzip.compress(table())[:20],
        gzip.compress(table()) + b"x",
        b"\x1f\x8b", b"\x1f\x8b" + bytes(100), table(), gzip.compress(b""), gzip.compress(gzip.compress(table())),
        gzip.compress(table())[:-8] + bytes(8), gzip.compress(b'{"gas":'), gzip.compress(bytes(10)) * 100,
    )
]  # fmt: skip
ENCODED += [posted(swollen(1024), CSV_PATH), posted(gzip.compress(table())[:30], CSV_PATH)]
MULTIPART = "Content-Type: multipart/form-data; boundary=x\r\n"
PART = b'--x\r\nContent-Disposition: form-data; name="%b"\r\n\r\n%b\r\n'
FORMS = [
    posted(b"--x\r\n", headers=MULTIPART), posted(PART % (b"gas", b"co2"), headers=MULTIPART),
    posted(PART % (b"csv", table()) + PART % (b"json", b"{}") + b"--x--\r\n", headers=MULTIPART),
    posted(PART % (b"a", b"1") * 1100 + b"--x--\r\n", headers=MULTIPART),
    posted(PART % (b"gas", b"co2") + b"--x--\r\n", headers="Content-Type: multipart/form-data\r\n"),
    posted(b"gas=co2&gas=co2"), posted(b"gas=%FF"), posted(b"gas=co2&unit=\xb0C"), posted(b"&".join([b"a=1"] * 5000)),
    posted(b"csv=a&json=b"), posted(b"gas=co2&form=csv"), posted(b"gas=co2&csvv=1"),
]  # fmt: skip
CHUNKED = b"POST /v1/flux?gas=co2 HTTP/1.1\r\nHost: x\r\nConnection: close\r\nTransfer-Encoding: chunked\r\n\r\n"
START = b"POST /v1/flux?gas=co2 HTTP/1.1\r\nHost: x\r\nConnection: close\r\n"
FRAMING = [
    *(CHUNKED + chunks for chunks in (
        b"zz\r\n", b"5\r\nabc", b"3\r\nabcdef\r\n0\r\n\r\n", b"-1\r\n\r\n", b"0x3\r\nabc\r\n0\r\n\r\n", b"\r\n",
        b"3 3\r\nabc\r\n0\r\n\r\n",
        b"f" * 20 + b"\r\n", b"3;" + b"x" * 9000 + b"\r\nabc\r\n0\r\n\r\n", b"3\nabc\n0\n\n", b"3\r\nabc\r\n",
        b"1\r\n\r\n0\r\n", b"",
        b"3\r\nabc\r\n0\r\nHost: y\r\n\r\n", b"3\r\nabc\r\n0\r\nbad trailer\r\n\r\n",
    )),
    *(START + b"Content-Length: " + text + b"\r\n\r\nabc" for text in (
        b"-1", b"+3", b"0x3", b"3.0", b"3,3", b"3 3", b"", b"three", b"\xb2", b"9" * 30, b"1000000000000", b"10",
    )),
    *(START + b"Transfer-Encoding: " + text + b"\r\n\r\n3\r\nabc\r\n0\r\n\r\n" for text in (
        b"gzip", b"identity", b"chunked, identity", b"chunked, chunked", b"xchunked", b"chunked\x0b", b"\x00",
    )),
    START + b"Content-Length: 3\r\nTransfer-Encoding: chunked\r\n\r\n0\r\n\r\n",
    START + b"Content-Length: 3\r\nContent-Length: 4\r\n\r\nabcd",
    b"POST /v1/flux HTTP/1.0\r\nTransfer-Encoding: chunked\r\n\r\n0\r\n\r\n",
    b"GET /v1/gases HTTP/1.1\r\nConnection: close\r\n\r\n", b"GET /v1/gases HTTP/1.1\r\nHost: x\r\nHost: y\r\n\r\n",
    b"GET /v1/gases HTTP/1.1\nHost: x\n\n", b"get /v1/gases HTTP/1.1\r\nHost: x\r\n\r\n", b"GET /v1/gases\r\n\r\n",
    b"GET /v1/gases HTTP/2.0\r\nHost: x\r\n\r\n", b"GET /v1/gases HTTP/9\r\nHost: x\r\n\r\n",
    b"GET  /v1 HTTP/1.1\r\nHost: x\r\n\r\n",
    b"GET /v1/gases HTP/1.1\r\nHost: x\r\n\r\n", b"\x16\x03\x01\x02\x00\x01\x00\x01\xfc\x03\x03\n\n", b"\x00\n",
    b"{}\n", b"HELO x\r\n\r\n",
    b"PRI * HTTP/2.0\r\n\r\nSM\r\n\r\n", b"GET /v1/flux?unit=\xb0C HTTP/1.1\r\nHost: x\r\n\r\n",
    b"GET /v1 x HTTP/1.1\r\nHost: x\r\n\r\n",
    b"GET /" + b"x" * 9000 + b" HTTP/1.1\r\nHost: x\r\n\r\n", b"G" * 30 + b" / HTTP/1.1\r\nHost: x\r\n\r\n",
    got("/v1", "".join(f"X-{i}: y\r\n" for i in range(101))), got("/v1", "X-Long: " + "y" * 16_000 + "\r\n"),
    got("/v1", "X Y: z\r\n"), got("/v1", "X\x00: z\r\n"), got("/v1", "X: a\x00b\r\n"), got("/v1", ": z\r\n"),
    got("/v1", "nothing\r\n"),
    got("/v1", "X: a\r\n folded\r\n"), got("/v1", "X : a\r\n"), got("/v1", "Expect: wonders\r\n"), got("/v1",
    "X: a\rb\r\n"),
]  # fmt: skip
HOSTILE = [
    *(posted(_raw(text)) for text in NUMBERS_IN_JSON),
    *(posted(_json("wind_speed", value)) for value in VALUES),
    *(posted(content) for content in OTHER_BODIES),
    *(posted(content, CSV_PATH) for content in TABLES if content.strip()),
    *QUERIES,
    *ENCODED,
    *FORMS,
    *FRAMING,
]
