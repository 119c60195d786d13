/// <reference types="office-js" />
/**
 * What we ask of Excel, and what can be known only by a later one. Every member of a set beyond the required one is
 * used behind one of these abilities.
 *
 * ExcelApi 1.9 is Windows build 1903, Office 2021 and LTSC 2021, Mac 16.24, iPad, and the web.
 */
import { WorkbookError } from '../../ports/workbook';

/** The same number stands in the manifest. */
export const requiredExcelApi = '1.9';

export interface ExcelAbilities {
  /** Comments can be found; 1.10. Without: a cell with a comment counts as free. */
  readonly findsComments: boolean;
  /** Cells that an array formula fills can be told from constants; 1.12. Without: by the text of the formulas. */
  readonly findsArrays: boolean;
  /** Merged cells can be found; 1.13. Without: a write into one is found out by reading it again. */
  readonly findsMergedCells: boolean;
  /** Notes can be found; 1.18. Without: as for comments. */
  readonly findsNotes: boolean;
  /** Several rectangles can be selected at once; 1.18. Without: the first of them. */
  readonly selectsAreas: boolean;
}

export function excelAbilities(): ExcelAbilities {
  return {
    findsComments: isSupported('1.10'),
    findsArrays: isSupported('1.12'),
    findsMergedCells: isSupported('1.13'),
    findsNotes: isSupported('1.18'),
    selectsAreas: isSupported('1.18'),
  };
}

/** @throws WorkbookError host-too-old */
export function refuseOldExcel(): void {
  if (!isSupported(requiredExcelApi)) {
    throw new WorkbookError(
      'host-too-old',
      'This version of Excel is too old for Planrow. It needs Microsoft 365, Excel 2021 or later, or Excel on the web.',
    );
  }
}

function isSupported(version: string): boolean {
  return Office.context.requirements.isSetSupported('ExcelApi', version);
}
