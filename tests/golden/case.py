"""What every written program shares: three pools without drives.

Pools are filled to the last byte and have no row but room unless a case asks for more.
Volumes of no size have no part in room: ``0 a@quay/fast`` only fills the left side.
"""

from smallestate import pool

from placer.estate import Estate, Media

FAST = pool("quay/fast", Media.FLASH, 500)
SLOW = pool("depot/slow", Media.SPINNING, 500)
NEAR = pool("quay/near", Media.SPINNING, 500)

Case = tuple[Estate, str]
