"""Every setting has limits, a wrong one stops the start with a clear line, and a check prints what is in force."""

import pytest

from service.__main__ import main
from service.config import VARIABLES, Config, ConfigurationError, read, strangers

GOOD = {
    "CATSPAW_BIND": ["127.0.0.1:0", "0.0.0.0:8660", "[::1]:80", "localhost:65535", "unix:/run/catspaw.sock", " a.b:1 "],
    "CATSPAW_WORKERS": ["1", "256", " 4 "],
    "CATSPAW_THREADS": ["1", "1024"],
    "CATSPAW_TOKEN": ["", "s3cret~!"],
    "CATSPAW_CORS": ["", "*", "https://lab.example", "http://127.0.0.1:8080"],
    "CATSPAW_CSV_BYTES": ["1000", "2147483648"],
    "CATSPAW_DRAIN_SECONDS": ["0", "3600"],
    "CATSPAW_LOG": ["none", "requests"],
    "CATSPAW_METRICS": ["on", "off"],
}
BAD = {
    "CATSPAW_BIND": ["", "8660", ":8660", "127.0.0.1", "127.0.0.1:65536", "http://x:1", "unix:x", "a b:1"],
    "CATSPAW_WORKERS": ["", "0", "257", "-1", "2.0", "two", "1_0", "\u0667", "9" * 5000, "0x2"],
    "CATSPAW_THREADS": ["0", "1025"],
    "CATSPAW_TOKEN": ["open sesame", "a\x07b", "\u00e9", "x" * 1001],
    "CATSPAW_CORS": ["lab.example", "https://a,https://b", "https://a/path", "**"],
    "CATSPAW_CSV_BYTES": ["999", "1e6"],
    "CATSPAW_DRAIN_SECONDS": ["3601", "-1"],
    "CATSPAW_LOG": ["all", ""],
    "CATSPAW_METRICS": ["yes"],
}


@pytest.mark.parametrize(("name", "text"), [(name, text) for name, texts in GOOD.items() for text in texts])
def test_a_good_setting_is_taken(name: str, text: str) -> None:
    value = getattr(read({name: text}), VARIABLES[name].name)

    assert str(value) == text.strip()


@pytest.mark.parametrize(("name", "text"), [(name, text) for name, texts in BAD.items() for text in texts])
def test_a_bad_setting_is_refused_in_one_line_that_says_what_is_allowed(name: str, text: str) -> None:
    with pytest.raises(ConfigurationError) as refused:
        read({name: text})
    told = str(refused.value)

    assert told.startswith(f"{name} must be ")
    assert told.isprintable()
    assert len(told) < 300
    if name == "CATSPAW_TOKEN":
        assert text not in told


def test_what_is_not_set_has_its_default() -> None:
    assert read({}) == read({"PATH": "/bin"}) == Config()


def test_every_setting_says_what_it_is_for() -> None:
    for each in VARIABLES.values():
        assert each.metadata["meaning"]
        assert "pattern" in each.metadata or each.metadata["low"] <= each.metadata["high"]


def test_a_variable_that_is_no_setting_is_told_with_the_nearest() -> None:
    found = strangers({"CATSPAW_WORKER": "3", "CATSPAW_SERVICE_HOST": "10.0.0.1", "CATSPAW_THREADS": "3", "OTHER": "x"})

    assert found == [
        "CATSPAW_SERVICE_HOST is no setting",
        "CATSPAW_WORKER is no setting: did you mean CATSPAW_WORKERS?",
    ]


def test_a_check_prints_the_settings_in_force_and_hides_the_token(
    monkeypatch: pytest.MonkeyPatch, capsys: pytest.CaptureFixture[str]
) -> None:
    monkeypatch.setenv("CATSPAW_TOKEN", "s3cret")
    monkeypatch.setenv("CATSPAW_THREADS", "9")
    status = main(["serve", "--check", "--workers", "3", "--bind", "0.0.0.0:80"])
    told = capsys.readouterr()

    assert status == 0
    assert [line.partition("=")[0] for line in told.out.splitlines()] == list(VARIABLES)
    assert {"CATSPAW_THREADS=9", "CATSPAW_WORKERS=3", "CATSPAW_BIND=0.0.0.0:80"} <= set(told.out.splitlines())
    assert "s3cret" not in told.out + told.err


def test_a_wrong_setting_stops_the_start(monkeypatch: pytest.MonkeyPatch, capsys: pytest.CaptureFixture[str]) -> None:
    monkeypatch.setenv("CATSPAW_THREADS", "many")
    by_variable = main(["serve"])
    monkeypatch.setenv("CATSPAW_THREADS", "9")
    by_option = main(["serve", "--workers", "0"])
    lines = capsys.readouterr().err.splitlines()

    assert (by_variable, by_option) == (2, 2)
    assert lines == [
        "catspaw: CATSPAW_THREADS must be a whole number from 1 to 1024, not 'many'",
        "catspaw: CATSPAW_WORKERS must be a whole number from 1 to 256, not '0'",
    ]


def test_listening_to_others_without_a_token_warns(
    monkeypatch: pytest.MonkeyPatch, capsys: pytest.CaptureFixture[str]
) -> None:
    monkeypatch.delenv("CATSPAW_TOKEN", raising=False)
    main(["serve", "--check", "--bind", "0.0.0.0:80"])
    open_to_all = capsys.readouterr().err
    main(["serve", "--check"])
    loopback = capsys.readouterr().err
    monkeypatch.setenv("CATSPAW_TOKEN", "s3cret")
    main(["serve", "--check", "--bind", "0.0.0.0:80"])
    guarded = capsys.readouterr().err

    assert "without CATSPAW_TOKEN" in open_to_all
    assert "without CATSPAW_TOKEN" not in loopback + guarded
