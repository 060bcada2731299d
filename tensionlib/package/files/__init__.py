"""Files a user keeps: the design file (TOML) and the schedule of members (CSV, XLSX)."""

from tensionlib.package.files.atomic import FileWriteError, write_atomic
from tensionlib.package.files.design_file import project_record, read_design_file
from tensionlib.package.files.fields import KnownNames
from tensionlib.package.files.problems import DesignFileError, Problem, ScheduleError
from tensionlib.package.files.reading import LARGEST_FILE
from tensionlib.package.files.records import (
    DesignFile,
    EndDetail,
    MemberRow,
    Project,
    Revision,
    ScheduleRows,
    ScheduleSettings,
    StandardChoice,
)
from tensionlib.package.files.schedule import read_schedule
from tensionlib.package.files.updating import update_design_file

__all__ = [
    "LARGEST_FILE",
    "DesignFile",
    "DesignFileError",
    "EndDetail",
    "FileWriteError",
    "KnownNames",
    "MemberRow",
    "Problem",
    "Project",
    "Revision",
    "ScheduleError",
    "ScheduleRows",
    "ScheduleSettings",
    "StandardChoice",
    "project_record",
    "read_design_file",
    "read_schedule",
    "update_design_file",
    "write_atomic",
]
