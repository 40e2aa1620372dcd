from __future__ import annotations

from pathlib import Path

import pytest

from dxfcheck.configuration.settings_file import read_settings_file
from dxfcheck.errors import SettingsInvalid
from dxfcheck.settings import Requirement
from tests.configuration.files import problems_of, settings_file

EVERYTHING = """
drives = ["A-B = 120 rpm cw"]
[reading]
units = "inch"
tolerance = 1
frame-pins = ["A", " D "]
part-blocks = ["BAR-*"]
[reading.layers]
frame = ["GROUND*", "MACHINE-BED"]
pitch = []
construction = ["DIM*"]
[expect]
mobility = 1
[expect.speeds]
"C" = "0.35 m/s ± 2 %"
[expect.ratios]
"C-D / A-B" = "0.5 ± 2 %"
[limits]
pin-speed = "2 m/s"
slide-speed = { "*" = "500 mm/s", "block at E" = "0.2 m/s" }
[rules]
empty-pin = "note"
[[accept]]
rule = "near-miss"
drawing = "line 2/tipper.dxf"
reason = "stop face"
[drawings."received/*.dxf".reading]
units = "in"
"""

TEN_MISTAKES = """\
drives = ["A-B = 120 rpm", "A-B : 3"]
[reading]
units = "mmm"
tolerance = "0.01"
frame_pins = ["A"]
mobility = 1
[expect.speeds]
C = "0.35 parsnips"
[rules]
unlabeled-pins = "off"
empty-pin = "offf"
[[accept]]
rule = "near-miss"
drawing = "x.dxf"
until = "2027-01-01"
[drawings.'received\\*.dxf'.reading]
units = "in"
"""


def test_a_file_that_states_everything_is_read(tmp_path: Path) -> None:
    file = settings_file(tmp_path, EVERYTHING)
    stated = {(each.key, each.name): each.value for each in file.statements}
    assert stated["drives", ""] == ("A-B = 120 rpm cw",)
    assert stated["reading.units", ""] == "in"
    assert stated["reading.tolerance", ""] == 1.0
    assert stated["reading.frame-pins", ""] == ("A", "D")
    assert stated["reading.layers.pitch", ""] == ()
    assert stated["expect.mobility", ""] == 1
    assert stated["rules.*", "empty-pin"] == "note"
    limit = stated["limits.slide-speed", "block at E"]
    assert isinstance(limit, Requirement)
    assert (limit.quantity, limit.subject, limit.where) == ("slide-speed", "block at E", f"{tmp_path}/dxfcheck.toml:20")
    assert ("limits.slide-speed", "*") in stated
    assert ("limits.pin-speed", "*") in stated
    assert [table.pattern for table in file.tables] == ["received/*.dxf"]
    assert [table.drawing for table in file.accepted] == ["line 2/tipper.dxf"]
    assert file.folder == tmp_path.resolve()


def test_ten_mistakes_are_ten_messages_each_with_line_key_and_remedy(tmp_path: Path) -> None:
    problems = problems_of(tmp_path, TEN_MISTAKES)
    expected = [
        ("dxfcheck.toml:1: drives: ", "it names no link before an equals sign; write for instance"),
        ("dxfcheck.toml:3: reading.units: ", 'length unit "mmm" is not known; did you mean "mm"?'),
        ("dxfcheck.toml:4: reading.tolerance: ", 'not the text "0.01"; write tolerance = 0.01'),
        ("dxfcheck.toml:5: reading.frame_pins: ", "there is no such key here; did you mean frame-pins?"),
        ("dxfcheck.toml:6: reading.mobility: ", "this key does not belong here; put mobility below [expect]"),
        ("dxfcheck.toml:8: expect.speeds.C: ", "write for instance '0.35 m/s"),
        ("dxfcheck.toml:10: rules.unlabeled-pins: ", "did you mean unlabelled-pins?"),
        ("dxfcheck.toml:11: rules.empty-pin: ", 'write one of "off", "note", "warning", "error"'),
        ("dxfcheck.toml:12: accept.reason: ", "it is missing: why it is accepted; write reason ="),
        ("dxfcheck.toml:15: accept.until: ", "write the day without quotes, as until = 2027-03-31"),
        ('dxfcheck.toml:16: drawings."received\\\\*.dxf": ', 'write "received/*.dxf"'),
    ]
    assert len(problems) == len(expected)
    for problem, (start, remedy) in zip(problems, expected, strict=True):
        assert problem.startswith(start)
        assert remedy in problem
        assert "\n" not in problem


@pytest.mark.parametrize(
    ("text", "problem"),
    [
        ('unit = "mm"', "1: unit: there is no such key here; did you mean units? put units below [reading]"),
        ('units = "mm"', "1: units: this key does not belong here; put units below [reading]"),
        (
            '[reading]\ndrives = ["A-B = 1 rad/s"]',
            ("2: reading.drives: this key does not belong here; "
            "put drives at the top of the file, before the first table"),
        ),
        ("[readng]\nx = 1", "1: readng: there is no such key here; did you mean reading?"),
        ("[reading.layers]\nwood = []", ("2: reading.layers.wood: there is no such key here; "
         "use one of construction, frame, pitch")),
        ("reading = 3", "1: reading: it must be a table, not the number 3; write [reading] on a line of its own"),
        ('rules = "off"', '1: rules: it must be a table, not the text "off"; write [rules] on a line of its own'),
        ("[rules]\nempty-pin = false", ('2: rules.empty-pin: false is no severity; '
         'write one of "off", "note", "warning", "error"')),
        ("[expect]\nmobility = true", "2: expect.mobility: it must be a whole number, not true; write mobility = 1"),
        ("[expect]\nmobility = 1.0", ("2: expect.mobility: it must be a whole number, not the number 1.0; "
         "write mobility = 1")),
        ("[reading]\ntolerance = inf", ("2: reading.tolerance: it must be a length above 0, not the number inf; "
         "write tolerance = 0.01")),
        ("[reading]\ntolerance = 0", ("2: reading.tolerance: it must be a length above 0, not the number 0; "
         "write tolerance = 0.01")),
        ('[reading]\nframe-pins = "A"', ("2: reading.frame-pins: it must be a list of names, "
         'not the text "A"; write frame-pins = ["A", "D"]')),
        ('[reading]\nframe-pins = [\n"A",\n" "]', ("4: reading.frame-pins: it must be a list of names: "
         'an empty text names nothing; write frame-pins = ["A", "D"]')),
        ("[limits]\npin-speed = 2", ("2: limits.pin-speed: it must be a text for all, "
         'or a table of texts by name, not the number 2; write pin-speed = "2 m/s"')),
        ('[limits]\ntransmission-angle = "100 deg"', (
            "2: limits.transmission-angle: it must be an angle above 0 and up to 90 degrees as a text, "
            'not the text "100 deg"; write transmission-angle = "45 deg"')),
        ("[limits]\ndoubtful-speed = 2", (
            "2: limits.doubtful-speed: it must be a part above 0 in per cent as a text, "
            'not the number 2; write doubtful-speed = "2 %"')),
        ("[limits.pin-speed]\nC = 3", ("2: limits.pin-speed.C: it must be a text for all, "
         'or a table of texts by name, not the number 3; write pin-speed = "2 m/s"')),
        ("[expect.speeds]\nC = 2", ('2: expect.speeds.C: it must be a text, not the number 2; '
         'write C = "0.35 m/s ± 2 %"')),
        ('[drawings]\nunits = "in"', ("2: drawings.units: drawings holds tables by pattern, "
         'not the text "in"; write [drawings."received/*.dxf".reading] for settings of some drawings')),
        ('[drawings."a.dxf"]\nunits = "in"', ('2: drawings."a.dxf".units: this key does not belong here; '
         'put units below [drawings."a.dxf".reading]')),
        ("[drawings.a.dxf]\nx = 1", ("1: drawings.a.dxf: a pattern with a dot stands in quotes; "
         'write [drawings."a.dxf"]')),
        ('[[drawings."a.dxf".accept]]\nx = 1', ('1: drawings."a.dxf".accept: accepted findings name their drawing '
         "themselves; write [[accept]] with drawing = ...")),
        ("drawings = 3", ('1: drawings: it must hold tables by pattern, not the number 3; '
         'write [drawings."received/*.dxf".reading]')),
        ("[accept]\nrule = 'near-miss'", ("1: accept: it must be an array of tables, not a table; "
         "write [[accept]] for each")),
        ('reason = "x"', "1: reason: there is no such key here; reason belongs below [[accept]]"),
    ],
)  # fmt: skip
def test_each_mistake_says_what_is_wrong_and_what_to_do(tmp_path: Path, text: str, problem: str) -> None:
    assert problems_of(tmp_path, text) == [f"dxfcheck.toml:{problem}"]


@pytest.mark.parametrize(
    ("text", "says"),
    [
        ("a = 1\nb = \n", "dxfcheck.toml:2: this is not TOML, column 5: "),
        ("a = 1\na = 2\n", "dxfcheck.toml:2: this is not TOML, column "),
        ("a = '''\n\n", "dxfcheck.toml:1: this is not TOML"),
        ("a = " + "[" * 100_000, "dxfcheck.toml: its lists are nested too deeply"),
    ],
    ids=["no value", "twice", "no end", "too deep"],
)
def test_what_is_no_toml_is_the_only_problem(tmp_path: Path, text: str, says: str) -> None:
    (problem,) = problems_of(tmp_path, text)
    assert problem.startswith(says)
    assert "; " in problem


def test_a_file_in_another_encoding_says_where(tmp_path: Path) -> None:
    path = tmp_path / "dxfcheck.toml"
    path.write_bytes(b"[expect.speeds]\n'Tr\xe4ger' = '1 m/s'\n")
    with pytest.raises(SettingsInvalid, match=r"dxfcheck.toml:2: a character is not in UTF-8; save the file as UTF-8"):
        read_settings_file(path)


def test_a_byte_order_mark_does_no_harm(tmp_path: Path) -> None:
    path = tmp_path / "dxfcheck.toml"
    path.write_bytes(b"\xef\xbb\xbf[expect]\r\nmobility = 2\r\n")
    assert [(each.value, each.line) for each in read_settings_file(path).statements] == [(2, 2)]


def test_a_file_that_is_not_there_or_is_a_folder(tmp_path: Path) -> None:
    with pytest.raises(SettingsInvalid, match="there is no such settings file; check the path"):
        read_settings_file(tmp_path / "gone.toml")
    with pytest.raises(SettingsInvalid, match="is a folder, not a settings file"):
        read_settings_file(tmp_path)


def test_a_project_file_is_read_in_its_table_alone(tmp_path: Path) -> None:
    text = '[project]\nname = "x"\n[tool.dxfcheck.reading]\nunits = "cm"\n'
    assert [(each.value, each.line) for each in settings_file(tmp_path, text, "pyproject.toml").statements] == [
        ("cm", 4)
    ]


def test_in_a_project_file_remedies_name_its_tables(tmp_path: Path) -> None:
    text = '[tool.dxfcheck]\nunits = "cm"\n[tool.dxfcheck.reading]\ndrives = []\n'
    assert problems_of(tmp_path, text, "pyproject.toml") == [
        "pyproject.toml:2: units: this key does not belong here; put units below [tool.dxfcheck.reading]",
        "pyproject.toml:4: reading.drives: this key does not belong here; put drives below [tool.dxfcheck]",
    ]
    assert problems_of(tmp_path, "[project]", "pyproject.toml") == [
        "pyproject.toml: it holds no table [tool.dxfcheck]; add one, or name another file"
    ]


def test_an_empty_file_states_nothing(tmp_path: Path) -> None:
    file = settings_file(tmp_path, "# nothing\n[reading]\n[drawings.'a.dxf']\n")
    assert file.statements == ()
    assert [table.statements for table in file.tables] == [()]


def test_a_link_to_nothing_is_told_as_such(tmp_path: Path) -> None:
    (tmp_path / "dxfcheck.toml").symlink_to("office-settings.toml")
    with pytest.raises(SettingsInvalid, match="a link to nothing; check where it leads"):
        read_settings_file(tmp_path / "dxfcheck.toml")


def test_tables_of_a_project_file_are_told_where_they_belong(tmp_path: Path) -> None:
    (problem,) = problems_of(tmp_path, "[tool.dxfcheck.reading]\nunits = 'mm'\n")
    assert problem.endswith("tables stand at the top; write [reading] for [tool.dxfcheck.reading]")
