/** What every picture carries beside its marks. */
export type TwinCell = string | number | null;

/** The data of a picture as a table: what "As table" shows and the CSV file holds. */
export type TwinTable = {
  columns: readonly { name: string; unit?: string; decimals?: number; numeric: boolean }[];
  rows: readonly (readonly TwinCell[])[];
};

export type Size = { width: number; height: number };

export type Picture = {
  /** Says what the picture shows. */
  title: string;
  /** The same finding for those who do not see it. */
  text: string;
  /** Cut, specification and fit: what a file must not lose when it leaves the page. */
  source: string;
  /** "independence not met" where it applies; drawn into every form of the picture. */
  stamp: string | null;
  fileName: string;
  table: TwinTable;
};
