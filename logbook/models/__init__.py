"""One file a noun; constraints in the database; PROTECT everywhere."""

from .act import ActRow
from .assessment import Assessment, Verdict, strictness
from .basis import Basis, BasisAdoption
from .component import Component, Location
from .disposition import (
    Deferral,
    DeferralRequest,
    Disposition,
    RestrictionConfirmed,
    Review,
)
from .inspection import (
    Crack,
    DepthBasis,
    Finding,
    Inspection,
    Measurement,
    StrikeOut,
    What,
)
from .job import AssessmentAsked, Beat
from .journal import Head, Leaf, NameBeside
from .licence import Licence
from .material import Material
from .membership import Membership, Role
from .person import Person
from .photo import Photo
from .policy import UnsignedPolicy
from .protected import ProtectedModel
from .record import Record
from .repair import Repair, ReturnToService
from .site import Site
from .standing import Standing
from .tablet import (
    Device,
    PhotoLayer,
    RoundDeclared,
    SentFromTablet,
    StopNote,
    TabletRules,
)
from .tray import TrayItem, TraySettled

__all__ = [
    "ActRow",
    "Assessment",
    "AssessmentAsked",
    "Basis",
    "BasisAdoption",
    "Beat",
    "Component",
    "Crack",
    "Deferral",
    "DeferralRequest",
    "DepthBasis",
    "Device",
    "Disposition",
    "Finding",
    "Head",
    "Inspection",
    "Leaf",
    "Licence",
    "Location",
    "Material",
    "Measurement",
    "Membership",
    "NameBeside",
    "Person",
    "Photo",
    "PhotoLayer",
    "ProtectedModel",
    "Record",
    "Repair",
    "RestrictionConfirmed",
    "ReturnToService",
    "Review",
    "Role",
    "RoundDeclared",
    "SentFromTablet",
    "Site",
    "Standing",
    "StopNote",
    "StrikeOut",
    "TabletRules",
    "TrayItem",
    "TraySettled",
    "UnsignedPolicy",
    "Verdict",
    "What",
    "strictness",
]
