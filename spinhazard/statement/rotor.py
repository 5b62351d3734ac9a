"""Shafts and the parts that turn with them, as stated. Dimensions and mass of a part are those of one piece."""

from __future__ import annotations

from typing import Annotated, Any, Literal, Self, Union, get_args

from pydantic import AfterValidator, Field, model_validator

from spinhazard.quantity.stated import Stated
from spinhazard.statement.fields import (
    Angle,
    AngularSpeed,
    Density,
    Fault,
    FileName,
    Gd2,
    Identifier,
    Inertia,
    Length,
    LengthOrZero,
    Mass,
    Model,
    Name,
    Ratio,
    Stress,
    Time,
    Unbalance,
    Wk2,
    finite,
)  # fmt: skip
from spinhazard.statement.materials import known_material

Direction = Literal["radial", "axial", "tangential"]
Material = Annotated[Name, AfterValidator(known_material)]
PIECES = ("sector", "blade", "segment", "insert", "jaw", "piece")
MOST_POINTS = 2000


class Fragment(Model):
    """The piece that can come off a part."""

    kind: Literal["sector", "blade", "segment", "insert", "jaw", "piece"] = "piece"
    angle: Angle | None = Field(None, description="angle of the sector that breaks out of a disk or ring")
    mass: Mass | None = Field(None, description="mass of the loose piece")
    radius: Length | None = Field(None, description="distance of the piece's centre of mass from the shaft axis")
    face: Length | None = Field(None, description="diameter of the smallest face of the piece that can hit the guard")


class PartBase(Model):
    """What every part takes, whatever its shape."""

    id: Identifier = Field(description="name of the part on this shaft")
    count: int = Field(1, strict=True, ge=1, le=10_000, description="number of identical pieces, evenly spaced")
    offset: LengthOrZero | None = Field(
        None, description="distance of the piece's own centre of mass from the shaft axis"
    )
    mass: Mass | None = Field(None, description="mass of one piece")
    density: Density | None = Field(None, description="density of the piece's material")
    material: Material | None = Field(None, description="material, by its name in the table")
    strength: Stress | None = Field(None, description="ultimate tensile strength")
    max_rated_speed: AngularSpeed | None = Field(None, description="largest speed marked on the part")
    fragment: Fragment | None = Field(None, description="the piece that can come off")

    @model_validator(mode="before")
    @classmethod
    def _short_fragment(cls, raw: Any) -> Any:
        """A fragment may be named by one word."""
        if isinstance(raw, dict) and isinstance(raw.get("fragment"), str):
            return {**raw, "fragment": {"kind": raw["fragment"]}}
        return raw


def _smaller(inner: Stated | None, outer: Stated, name: str, outer_name: str) -> None:
    """Refuse an inner dimension that is, or could within the stated spreads be, as large as the outer one."""
    if inner is None or inner.high < outer.low:
        return
    problem = f"not smaller than {outer_name} ({outer.text})"
    if inner.value < outer.value:
        problem = f"within the stated spreads not smaller than {outer_name} ({outer.text})"
    raise Fault(problem, field=name, stated=inner.text, accepted=f"a length below {outer_name}")


class Disk(PartBase):
    """Disk or cylinder, solid or bored, axis along the shaft."""

    shape: Literal["disk"]
    diameter: Length = Field(description="outer diameter of the disk")
    bore: LengthOrZero | None = Field(None, description="diameter of the hole in the middle")
    thickness: Length | None = Field(None, description="thickness along the shaft")

    @model_validator(mode="after")
    def _bore_fits(self) -> Self:
        _smaller(self.bore, self.diameter, "bore", "diameter")
        return self


class Ring(PartBase):
    """Ring or rim, axis along the shaft."""

    shape: Literal["ring"]
    outer_diameter: Length = Field(description="outer diameter of the ring")
    inner_diameter: Length = Field(description="inner diameter of the ring")
    width: Length | None = Field(None, description="width along the shaft")

    @model_validator(mode="after")
    def _inner_fits(self) -> Self:
        _smaller(self.inner_diameter, self.outer_diameter, "inner_diameter", "outer_diameter")
        return self


class Sphere(PartBase):
    """Sphere, solid or hollow."""

    shape: Literal["sphere"]
    diameter: Length = Field(description="outer diameter of the sphere")
    inner_diameter: LengthOrZero | None = Field(None, description="diameter of the hollow inside")

    @model_validator(mode="after")
    def _inner_fits(self) -> Self:
        _smaller(self.inner_diameter, self.diameter, "inner_diameter", "diameter")
        return self


class Rod(PartBase):
    """Slender rod, its centre at `offset` from the shaft axis."""

    shape: Literal["rod"]
    length: Length = Field(description="length of the rod")
    direction: Direction = Field(description="which way the rod lies")


class Plate(PartBase):
    """Rectangular plate or block, its centre at `offset` from the shaft axis."""

    shape: Literal["plate"]
    radial: Length = Field(description="extent away from the shaft axis")
    axial: Length | None = Field(None, description="extent along the shaft")
    tangential: Length = Field(description="extent in the direction of motion")


class Cone(PartBase):
    """Cone or frustum, axis along the shaft, solid or with a cylindrical bore."""

    shape: Literal["cone"]
    large_diameter: Length = Field(description="diameter at the large end")
    small_diameter: LengthOrZero = Field(description="diameter at the small end, 0 mm for a full cone")
    bore: LengthOrZero | None = Field(None, description="diameter of the hole along the axis")
    length: Length | None = Field(None, description="length along the shaft")

    @model_validator(mode="after")
    def _ends_fit(self) -> Self:
        if self.small_diameter.value > self.large_diameter.value:
            raise Fault(
                f"larger than large_diameter ({self.large_diameter.text})", field="small_diameter",
                stated=self.small_diameter.text, accepted="a length of at most large_diameter",
            )  # fmt: skip
        if self.bore is not None and self.bore.value > 0.0:
            _smaller(self.bore, self.small_diameter, "bore", "small_diameter")
        return self


class Torus(PartBase):
    """Ring of round section, axis along the shaft."""

    shape: Literal["torus"]
    ring_diameter: Length = Field(description="diameter of the circle through the centres of the section")
    section_diameter: Length = Field(description="diameter of the round section")

    @model_validator(mode="after")
    def _section_fits(self) -> Self:
        if self.section_diameter.value > self.ring_diameter.value:
            raise Fault(
                f"larger than ring_diameter ({self.ring_diameter.text})", field="section_diameter",
                stated=self.section_diameter.text, accepted="a length of at most ring_diameter",
            )  # fmt: skip
        return self


class Profile(PartBase):
    """Body of revolution about the shaft, given by its half-section."""

    shape: Literal["profile"]
    points: tuple[tuple[float, float], ...] = Field(
        min_length=3, max_length=MOST_POINTS, description="corners [r, z] of the half-section, in order round it"
    )
    unit: Literal["m", "cm", "mm", "in", "ft"] = Field(description="unit of the points")

    @model_validator(mode="after")
    def _closed_and_positive(self) -> Self:
        for index, (radius, height) in enumerate(self.points):
            if not (finite(radius) and finite(height)) or radius < 0.0:
                raise Fault(
                    f"point {index + 1} has a negative or unusable coordinate", field="points", stated=[radius, height],
                    accepted="pairs [r, z] with r of at least 0",
                )  # fmt: skip
        if self.offset is not None and self.offset.value > 0.0:
            raise Fault(
                "a profile turns about the shaft itself", field="offset", stated=self.offset.text, accepted="no offset"
            )
        return self


class Point(PartBase):
    """Mass small against its distance from the axis."""

    shape: Literal["point"]
    radius: Length = Field(description="distance of the mass from the shaft axis")


class Linear(PartBase):
    """Mass that the shaft moves along a line: a belt, a table, a counterweight on a cord."""

    shape: Literal["linear"]
    radius: Length = Field(description="radius at which the shaft moves it: speed along the line over rotational speed")


class Mesh(PartBase):
    """Body given by its closed surface; the shaft passes through the origin of the file."""

    shape: Literal["mesh"]
    file: FileName = Field(description="STL file beside this one")
    unit: Literal["m", "cm", "mm", "in", "ft"] = Field(description="unit of the STL file")
    axis: Literal["x", "y", "z"] = Field(description="direction of the shaft in the STL file")

    @model_validator(mode="after")
    def _stands_where_it_is(self) -> Self:
        if self.offset is not None and self.offset.value > 0.0:
            raise Fault(
                "a mesh stands where its file puts it", field="offset", stated=self.offset.text, accepted="no offset"
            )
        return self


class Bifilar(Model):
    """Swing on two parallel cords."""

    distance: Length = Field(description="distance between the two cords")
    length: Length = Field(description="length of the cords")
    period: Time = Field(description="time of one full swing")


class Trifilar(Model):
    """Swing on three parallel cords."""

    radius: Length = Field(description="radius of the circle of the cords")
    length: Length = Field(description="length of the cords")
    period: Time = Field(description="time of one full swing")


class FallingWeight(Model):
    """Rotor turned from rest by a weight on a cord."""

    weight: Mass = Field(description="mass of the weight")
    radius: Length = Field(description="radius the cord acts on")
    height: Length = Field(description="height fallen")
    time: Time = Field(description="time the fall takes")


INERTIAS = ("inertia", "gd2", "wk2", "bifilar", "trifilar", "falling_weight")


class StatedInertia(PartBase):
    """Part whose inertia is read from a data sheet or was measured."""

    shape: Literal["stated"]
    inertia: Inertia | None = Field(None, description="moment of inertia about its own axis")
    gd2: Gd2 | None = Field(None, description="GD² of a data sheet")
    wk2: Wk2 | None = Field(None, description="WK² or WR² of a data sheet")
    bifilar: Bifilar | None = Field(None, description="measured on two cords")
    trifilar: Trifilar | None = Field(None, description="measured on three cords")
    falling_weight: FallingWeight | None = Field(None, description="measured with a falling weight")
    tip_radius: Length | None = Field(None, description="distance of the outermost point from the shaft axis")

    @model_validator(mode="after")
    def _one_inertia(self) -> Self:
        stated = [name for name in INERTIAS if getattr(self, name) is not None]
        if len(stated) != 1:
            raise Fault(
                "states no inertia" if not stated else f"states {' and '.join(stated)}", field="inertia",
                accepted="exactly one of " + ", ".join(INERTIAS),
            )  # fmt: skip
        return self


Part = Annotated[
    Union[Disk, Ring, Sphere, Rod, Plate, Cone, Torus, Profile, Point, Linear, Mesh, StatedInertia],  # noqa: UP007  (get_args below)
    Field(discriminator="shape"),
]
SHAPES: dict[str, type[PartBase]] = {
    get_args(model.model_fields["shape"].annotation)[0]: model for model in get_args(get_args(Part)[0])
}


class Shaft(Model):
    """A rigid body turning at one speed, alone or coupled to another shaft."""

    id: Identifier = Field(description="name of the shaft")
    speed: AngularSpeed | None = Field(None, description="speed in running, at the shaft itself")
    max_speed: AngularSpeed | None = Field(None, description="highest speed the drive or the process can reach")
    driven_by: Identifier | None = Field(None, description="shaft this one is rigidly coupled to")
    ratio: Ratio | None = Field(None, description="turns of this shaft for one turn of the shaft it is coupled to")
    drive: Literal["fixed speed", "inverter", "pole change", "belt", "turbine", "hydraulic", "process"] | None = Field(
        None, description="what sets the speed"
    )
    unbalance: Unbalance | None = Field(
        None, description="static unbalance: mass times distance of its centre from the axis"
    )
    parts: tuple[Part, ...] = Field(alias="part", min_length=1, max_length=500, description="parts on this shaft")

    @model_validator(mode="after")
    def _coupling_is_whole(self) -> Self:
        if (self.driven_by is None) != (self.ratio is None):
            missing, there = ("ratio", "driven_by") if self.ratio is None else ("driven_by", "ratio")
            raise Fault(
                f"{there} is stated without {missing}", field=missing, accepted="both driven_by and ratio, or neither"
            )
        if self.max_speed is not None and self.speed is not None and self.max_speed.value < self.speed.low:
            raise Fault(
                f"below the running speed ({self.speed.text})", field="max_speed", stated=self.max_speed.text,
                accepted="the highest attainable speed, at least the running speed",
            )  # fmt: skip
        return self
