"""What a volume is for, as far as it decides where others may stand."""

from enum import StrEnum


class Role(StrEnum):
    """Role of a volume; ``placer.workbook.reading.roles`` turns roles into rules."""

    DATA = "data"
    LOG = "log"
    BOOT = "boot"
    QUORUM = "quorum"
    REPLICA = "replica"
    CLONE_PARENT = "clone parent"
    BACKUP = "backup"
