/** Sizes beyond which a table is refused rather than read slowly. */
export const limits = {
  bytes: 20 * 1024 * 1024,
  /** Filled rows under the heading. */
  rows: 200_000,
  /** Cells of the tables, blank ones too: a file of nothing but separators would fill the memory. */
  cells: 3_000_000,
  /** A workbook keeps far more per cell than text does. */
  workbookCells: 1_500_000,
  columns: 16_384,
  /** What a workbook may hold when unpacked, and one part of it in proportion to its packed size. */
  unpackedBytes: 256 * 1024 * 1024,
  entries: 2_000,
  /** A longer cell is prose, whatever it starts with. */
  measurementLength: 120,
} as const
