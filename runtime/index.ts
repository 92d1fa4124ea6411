// The public surface: what a notebook imports. The engine and the compiler are imported by their own files.

export type {
  Caution,
  Drawing,
  DrawingContext,
  Figure,
  Head,
  Lead,
  MarginMark,
  MarginNote,
  Note,
  Rationale,
  RestedOn,
  Table,
  TableCell,
  TableRow,
} from "./shown.ts";
export * from "./vocabulary.ts";
