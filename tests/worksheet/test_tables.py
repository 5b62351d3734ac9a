"""Rotor, guards, stated values, policy, signatures; long and short machines."""

import pytest

from spinhazard import Policy, assess, assessment_from_text
from spinhazard.facts.records import values_of
from spinhazard.quantity.display import display


def test_every_part_stands_with_energy_and_share(made, flat):
    result, paper = made
    section = paper.section("Rotor")

    for part in result.sheet.subjects.parts:
        assert flat(part.entity.id) in section
        energy, share = result.fact("kinetic_energy", part.name), result.fact("energy_share", part.name)
        assert flat(display(energy.best, "J") + f"{100 * share.best:.1f} %") in section


def test_shares_of_energy_make_the_whole(made):
    result, _ = made

    assert sum(result.fact("energy_share", part.name).best for part in result.sheet.subjects.parts) == pytest.approx(
        1.0
    )


def test_every_guard_stands_with_distance_and_access_time(made, flat):
    result, paper = made
    section = paper.section("Guards")

    assert result.sheet.subjects.guards
    for guard in result.sheet.subjects.guards:
        texts = [
            display(result.fact(key, guard.name).best, unit)
            for key, unit in (("guard_distance", "m"), ("access_time", "s"))
        ]
        assert flat("".join(texts)) in section


def test_openings_stand_against_their_limit(made, flat):
    result, paper = made

    for guard in result.sheet.subjects.guards:
        if guard.entity.openings:
            limit = result.fact("opening_limit", guard.name)
            size = result.fact("opening_size", guard.name)
            assert flat(display(size.best, "m") + display(limit.best, "m")) in paper.section("Guards")


def test_every_stated_value_stands_with_path_text_and_source(made, flat):
    result, paper = made
    section = paper.section("Stated values")

    for path, stated in values_of(result.file):
        assert flat(path) in section
        assert flat(stated.text) in section
        assert flat(stated.source) in section
        assert flat(stated.note) in section
        assert flat(stated.instrument) in section


def test_spread_from_the_policy_is_marked(made):
    result, paper = made
    taken = [stated for _, stated in values_of(result.file) if stated.half_width is None and stated.source]

    assert taken
    assert "(policy)" in paper.section("Stated values")


def test_policy_digests_settings_and_deviations_stand(fan, printed, flat):
    reading = assessment_from_text(fan, name="fan")
    changed = Policy(name="works policy", draws=200, wait_margin=1.5)
    result = assess(reading, policy=changed)
    section = printed(result).section("Policy and sources")

    assert "workspolicy" in section
    for digest in result.digests.values():
        assert digest in section
    assert flat("wait_margin 1.2 1.5") in section
    for line in changed.as_text().split("\n"):
        name, value = line.split(" = ", 1)
        assert flat(name.replace("_", " ")) in section
        assert flat(value) in section


def test_shipped_policy_has_no_deviations(made):
    _, paper = made

    assert "DeviationsfromtheshippeddefaultsNone." in paper.section("Policy and sources")


def test_sources_say_where_their_figures_come_from(made):
    _, paper = made

    assert "figuresfrom" in paper.section("Policy and sources")
    assert "memory" in paper.section("Policy and sources")


def test_signatures_are_prepared_checked_and_released(made, flat):
    result, paper = made
    section = paper.section("Signatures").partition("namerole")[2]

    assert section.index("preparedby") < section.index("checkedby") < section.index("releasedby")
    assert flat(result.file.assessment.assessor) in section


def test_machine_with_nothing_but_a_disk_gives_a_worksheet(least, printed):
    paper = printed(assess(assessment_from_text(least, name="least")))

    assert "Noguardisstated." in paper.section("Guards")
    assert "shaft.s.speed" in paper.section("Data missing")


def test_machine_of_sixty_parts_and_twenty_guards_gives_a_worksheet_that_loses_none(printed):
    parts = "".join(
        f'[[shaft.part]]\nid = "part number {i}"\nshape = "disk"\ndiameter = "{300 + i} mm"\nmass = "{i + 1} kg"\n'
        for i in range(60)
    )
    guards = "".join(
        f'[[guard]]\nid = "guard number {i}"\ncovers = ["s"]\nkind = "hinged"\ndistance = "{100 + i} mm"\n'
        for i in range(20)
    )
    text = 'format = 1\n[machine]\ntag = "LONG"\n[[shaft]]\nid = "s"\nspeed = "900 rpm"\n' + parts + guards
    paper = printed(assess(assessment_from_text(text, name="long"), policy=Policy(draws=200)))

    for number in range(60):
        assert f"partnumber{number}(s)" in paper.section("Rotor")
    for number in range(20):
        assert f"guardnumber{number}" in paper.section("Guards")
