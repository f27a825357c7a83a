"""How much is read before an input is refused. Each limit is stated in the sentence that refuses."""

MAX_DECK_BYTES = 64 * 1024**2
MAX_LINE_BYTES = 64 * 1024
MAX_FRAME_ATOMS = 2_000_000
MAX_COORDINATE_ANGSTROM = 1e6

MAX_COMPLAINTS_PER_LIST = 20
MAX_COMPLAINTS = 100

CHUNK_BYTES = 1024**2
BLOCK_ROWS = 65_536
