"""What the loader refuses, word for word, with file and line."""

import pytest

from spinhazard.errors import CatalogueError
from spinhazard.rules.levers import is_lever, nearest_lever
from spinhazard.rules.loading import catalogue_of, load_rules, shipped_catalogue
from spinhazard.rules.rule import Alternatives, Comparison, Operand

RULE = """# a rule of a site
[[rule]]
key     = "wait-very-short"
since   = "0.1.0"
asks    = "Is the wait very short?"
because = "A short wait is over before the rotor stands still."
each    = "lockout"
review  = [["stated_wait", "is below", "required_wait"]]
urgency = "before next access"
says    = "Wait {stated_wait} against {required_wait}, margin {policy.wait_margin}."
basis   = ["practice"]
"""


def loaded(text):
    return load_rules(text, name="site.toml", family="site")


def refused(text):
    with pytest.raises(CatalogueError, match=r"site\.toml") as caught:
        loaded(text)
    return str(caught.value)


def test_a_rule_in_order_is_read():
    (rule,) = loaded(RULE)

    assert rule.key == "wait-very-short"
    assert rule.family == "site"
    assert rule.applies == ()
    assert rule.review == (Comparison("stated_wait", "is below", Operand("fact", "required_wait")),)
    assert (rule.measures, rule.examples, rule.withdrawn) == ((), (), "")


REPLACED = [
    ("unknown fact", '["stated_wait", "is below"', '["stated_wat", "is below"',
     'site.toml, line 2, wait-very-short.review: no such fact. Stated: "stated_wat". Nearest: stated_wait.'),
    ("fact that is no text", '["stated_wait", "is below"', '[3, "is below"',
     "site.toml, line 2, wait-very-short.review: no such fact. Stated: 3."),
    ("unknown comparison word", '"is below"', '"is under"',
     'Stated: "is under". Accepted: exceeds, is below, is, is not, is one of, is stated. Nearest: is one of.'),
    ("unknown kind of subject", '"lockout"', '"locks"',
     'Stated: "locks". Accepted: machine, shaft, part, stop, guard, lockout. Nearest: lockout.'),
    ("unknown urgency", '"before next access"', '"at once"', 'wait-very-short.urgency: not a word known here. Stated: "at once".'),
    ("unknown source", '["practice"]', '["iso-14120 5", "practise"]',
     'wait-very-short.basis: no source has the id "practise"; the nearest is "practice". Stated: "practise".'),
    ("no source", '["practice"]', "[]", "wait-very-short.basis: a rule needs a basis."),
    ("sources as one text", '["practice"]', '"practice"', "wait-very-short.basis: not a list of texts."),
    ("unlike kinds of two facts", '"required_wait"]]', '"stored_energy"]]',
     'wait-very-short.review: stated_wait and stored_energy are of different kinds. Stated: "stored_energy".'),
    ("number against a word", '"required_wait"]]', '"verification"]]',
     "wait-very-short.review: stated_wait and verification are of different kinds."),
    ("unlike kinds of fact and policy", '"required_wait"]]', '"policy.wait_energy_level"]]',
     "wait-very-short.review: stated_wait and policy.wait_energy_level are of different kinds."),
    ("unlike kinds of fact and value", '"required_wait"]]', '"5 kg"]]',
     "wait-very-short.review: neither a fact, a policy setting, nor a value for stated_wait ("),
    ("value without unit", '"required_wait"]]', "300]]",
     "wait-very-short.review: neither a fact, a policy setting, nor a value for stated_wait (a number without unit is not"),
    ("unknown setting", '"required_wait"]]', '"policy.wait_magin"]]',
     'wait-very-short.review: no such number in the policy. Stated: "policy.wait_magin". Nearest: policy.wait_margin.'),
    ("setting that is no number", '"required_wait"]]', '"policy.figures"]]',
     'wait-very-short.review: no such number in the policy. Stated: "policy.figures".'),
    ("word that exceeds", '["stated_wait", "is below", "required_wait"]', '["verification", "exceeds", "3 s"]',
     'wait-very-short.review: a word cannot exceed or be below anything. Stated: "verification".'),
    ("number that is a word", '["stated_wait", "is below", "required_wait"]', '["stated_wait", "is", "none"]',
     'wait-very-short.review: "is" compares words; stated_wait is a number. Stated: "none".'),
    ("word against a number", '["stated_wait", "is below", "required_wait"]', '["verification", "is", 3]',
     "wait-very-short.review: neither a word nor true or false. Stated: 3."),
    ("one of no list", '["stated_wait", "is below", "required_wait"]', '["verification", "is one of", "none"]',
     'wait-very-short.review: not a list of words. Stated: "none".'),
    ("one of an empty list", '["stated_wait", "is below", "required_wait"]', '["verification", "is one of", []]',
     "wait-very-short.review: not a list of words. Stated: []."),
    ("stated with a word", '["stated_wait", "is below", "required_wait"]', '["stated_wait", "is stated", "no"]',
     'wait-very-short.review: neither true nor false. Stated: "no".'),
    ("fact of another subject", '["stated_wait", "is below", "required_wait"]', '["lock_timer", "is below", "required_wait"]',
     'wait-very-short.review: a fact of each guard cannot be asked for each lockout. Stated: "lock_timer".'),
    ("fact of a unit without notation", 'each    = "lockout"\nreview  = [["stated_wait", "is below", "required_wait"]]',
     'each    = "machine"\nreview  = [["angular_momentum", "exceeds", "5 N m"]]',
     'wait-very-short.review: angular_momentum can be compared with facts only. Stated: "5 N m".'),
    ("nothing to compare with", '["stated_wait", "is below", "required_wait"]', '["stated_wait", "is below"]',
     "wait-very-short.review: nothing to compare with."),
    ("too long a condition", '["stated_wait", "is below", "required_wait"]', '["stated_wait", "is below", "1 s", "2 s"]',
     "wait-very-short.review: not a condition."),
    ("condition as text", '["stated_wait", "is below", "required_wait"]', '"stated_wait is below 3 s"',
     'not a condition. Stated: "stated_wait is below 3 s". Accepted: [fact, word, value] or { any = [...] }.'),
    ("alternatives under another name", '["stated_wait", "is below", "required_wait"]', "{ either = [] }",
     "wait-very-short.review: not a condition."),
    ("alternatives without any", '["stated_wait", "is below", "required_wait"]', "{ any = [] }",
     "wait-very-short.review: not a condition."),
    ("no condition at all", '[["stated_wait", "is below", "required_wait"]]', "[]", "wait-very-short.review: nothing is compared."),
    ("conditions that are no list", '[["stated_wait", "is below", "required_wait"]]', '"always"',
     'wait-very-short.review: not a list of conditions. Stated: "always".'),
    ("unknown placeholder", "{stated_wait}", "{stated_weight}",
     'wait-very-short.says: no such fact. Stated: "stated_weight". Nearest:'),
    ("placeholder of another subject", "{stated_wait}", "{lock_timer}",
     'wait-very-short.says: a fact of each guard cannot be asked for each lockout. Stated: "lock_timer".'),
    ("placeholder of no setting", "{policy.wait_margin}", "{policy.margin}", "wait-very-short.says: no such number in the policy."),
    ("brace that is no placeholder", "{stated_wait}", "{stated wait}", "wait-very-short.says: a brace that is no placeholder."),
    ("remedy for a key", '"wait-very-short"', '"no-wait"', "line 2, no-wait.key: a key names the condition found, in lower case"),
    ("key in capitals", '"wait-very-short"', '"Wait-Short"', "Wait-Short.key: a key names the condition found"),
    ("key that is no text", '"wait-very-short"', "7", "line 2, rule 1.key: not a text. Stated: 7."),
    ("empty question", '"Is the wait very short?"', '" "', 'wait-very-short.asks: not a text. Stated: " ".'),
    ("unknown field", 'since   = "0.1.0"', 'since = "0.1.0"\nseverity = "high"', "wait-very-short.severity: no such field in a rule."),
    ("field left out", 'since   = "0.1.0"\n', "", "wait-very-short.since: this field is needed and is not stated."),
    ("withdrawn without reason", 'since   = "0.1.0"', 'since = "0.1.0"\nwithdrawn = "0.2.0"',
     "wait-very-short.withdrawn_because: this field is needed and is not stated."),
]  # fmt: skip


@pytest.mark.parametrize(
    ("before", "after", "message"), [case[1:] for case in REPLACED], ids=[case[0] for case in REPLACED]
)
def test_the_loader_refuses(before, after, message):
    assert RULE.count(before) == 1

    said = refused(RULE.replace(before, after))

    assert said.startswith("site.toml, line 2, ")
    assert message in said


ADDED = [
    ("unknown lever", 'measures = ["lockout.weight"]',
     'wait-very-short.measures: no such field in an assessment file. Stated: "lockout.weight". Nearest: lockout.wait.'),
    ("levers as one text", 'measures = "lockout.wait"', "wait-very-short.measures: not a list of texts."),
    ("examples as a text", 'example = "none"', "wait-very-short.example: examples are not written as [[rule.example]] tables."),
    ("example with an unknown outcome", '[[rule.example]]\nexpect = "flagged"',
     'wait-very-short.example.expect: not a word known here. Stated: "flagged".'),
    ("example without outcome", "[[rule.example]]\ngiven = {}", "wait-very-short.example.expect: not a word known here."),
    ("example with an unknown fact", '[[rule.example]]\ngiven = { waiting = "3 s" }\nexpect = "for review"',
     'wait-very-short.example.given: no such fact. Stated: "waiting".'),
    ("example with an unknown field", '[[rule.example]]\nexpects = "for review"',
     "wait-very-short.example.expects: no such field in an example. Accepted: given, expect, note."),
    ("example given as a text", '[[rule.example]]\ngiven = "3 s"\nexpect = "for review"',
     "wait-very-short.example.given: not a table of facts."),
    ("example with a number for a note", '[[rule.example]]\nnote = 3\nexpect = "for review"',
     "wait-very-short.example.note: not a text."),
]  # fmt: skip


@pytest.mark.parametrize(("more", "message"), [case[1:] for case in ADDED], ids=[case[0] for case in ADDED])
def test_the_loader_refuses_further_fields(more, message):
    said = refused(f"{RULE}{more}\n")

    assert said.startswith("site.toml, line 2, ")
    assert message in said


def test_text_that_is_no_toml_is_refused():
    assert "site.toml: not readable as TOML (" in refused("[[rule]\nkey = ")


@pytest.mark.parametrize("text", ['rule = "x"', "rule = [1, 2]", "[rule]\nkey = 1"])
def test_rules_that_are_no_tables_are_refused(text):
    assert refused(text) == "site.toml, rule: rules are not written as [[rule]] tables."


def test_every_wrong_rule_of_a_file_is_told_with_its_own_line():
    text = RULE.replace('"lockout"', '"locks"') + RULE + RULE.replace('"practice"', '"nowhere"')

    told = refused(text).split("\n")

    assert [line.partition(": ")[0] for line in told] == [
        "site.toml, line 2, wait-very-short.each", "site.toml, line 24, wait-very-short.basis",
    ]  # fmt: skip


def test_a_key_used_twice_in_a_file_is_refused_with_the_line_of_the_second():
    with pytest.raises(
        CatalogueError, match=r'site\.toml, line 13, key: another rule has this key\. Stated: "wait-very-short"'
    ):
        catalogue_of([("site.toml", RULE + RULE)])


def test_a_key_used_in_two_files_is_refused_with_the_second_file():
    with pytest.raises(CatalogueError, match=r"more\.toml, line 2, key: another rule has this key"):
        catalogue_of([("site.toml", RULE), ("more.toml", RULE)])


def test_rules_of_several_files_keep_their_order_and_families():
    catalogue = catalogue_of([("b.toml", RULE), ("a.toml", RULE.replace("wait-very-short", "wait-even-shorter"))])

    assert [(rule.family, rule.key) for rule in catalogue.rules] == [
        ("b", "wait-very-short"),
        ("a", "wait-even-shorter"),
    ]
    assert catalogue.rule("wait-even-shorter").family == "a"


def test_the_digest_changes_with_a_single_letter():
    digest = catalogue_of([("site.toml", RULE)]).digest

    assert digest == catalogue_of([("site.toml", RULE)]).digest
    assert digest != catalogue_of([("site.toml", RULE.replace("Wait {", "wait {"))]).digest
    assert digest.startswith("sha256:")


def test_an_unknown_key_is_answered_with_the_nearest():
    with pytest.raises(
        CatalogueError, match=r'no rule has this key\. Stated: "wait-shorter".*Nearest: wait-shorter-than-stop'
    ):
        shipped_catalogue(examples=True).rule("wait-shorter")


def test_a_key_like_no_other_is_answered_without_a_guess():
    with pytest.raises(CatalogueError, match=r'Stated: "zzzzzzzz"\. Accepted: a key that `spinhazard rules` lists\.\Z'):
        shipped_catalogue(examples=True).rule("zzzzzzzz")


def test_a_withdrawn_rule_keeps_its_reason():
    (rule,) = loaded(
        RULE.replace('since   = "0.1.0"', 'since = "0.1.0"\nwithdrawn = "0.4.0"\nwithdrawn_because = "Merged."')
    )

    assert (rule.withdrawn, rule.withdrawn_because) == ("0.4.0", "Merged.")


def test_alternatives_words_and_yes_and_no_are_read():
    text = RULE.replace(
        '["stated_wait", "is below", "required_wait"]',
        '{ any = [["verification", "is one of", ["none", "tachometer"]], ["is_blocked", "is not", true]] }, '
        '["stated_wait", "is stated"], ["stated_wait", "exceeds", "policy.procedure_age_limit"], '
        '["stated_wait", "exceeds", "1 min"]',
    )

    (rule,) = loaded(text)

    alternatives, stated, setting, value = rule.review
    assert isinstance(alternatives, Alternatives)
    assert [line.operand.value for line in alternatives.conditions] == [("none", "tachometer"), True]
    assert stated.operand.value is True
    assert (setting.operand.kind, setting.operand.name) == ("policy", "procedure_age_limit")
    assert (value.operand.name, value.operand.value) == ("1 min", 60.0)
    assert len(rule.comparisons()) == 5


def test_levers_are_the_fields_of_the_assessment_file():
    for path in (
        "guard.distance",
        "shaft.part.diameter",
        "stopping.brake.torque",
        "guard.opening.size",
        "lockout.wait",
    ):
        assert is_lever(path)
    for path in ("guard.colour", "part.mass", "shaft.parts.mass", ""):
        assert not is_lever(path)
    assert nearest_lever("guard.distanc") == "guard.distance"
    assert nearest_lever("§§§") == ""
