/**
 * Filters that hide rows in which results would stand.
 */
export interface SheetFilters {
  /** Shows every row of these sheets again; the filters' buttons stay. @throws WorkbookError */
  clear(sheets: readonly string[]): Promise<void>;
}
