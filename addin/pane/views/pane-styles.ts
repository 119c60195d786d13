/**
 * The pane's few styles beyond those of its controls, for widths from 320 to 450 pixels.
 */
import { makeStyles, tokens } from '@fluentui/react-components';

/** Height of a table's line in pixels: two lines of text. The tables count on it. */
export const lineHeight = 46;

export const usePaneStyles = makeStyles({
  frame: {
    display: 'flex',
    flexDirection: 'column',
    height: '100vh',
    minWidth: '300px',
    overflowX: 'hidden',
    backgroundColor: tokens.colorNeutralBackground1,
    color: tokens.colorNeutralForeground1,
  },
  header: {
    display: 'flex',
    flexDirection: 'column',
    gap: tokens.spacingVerticalS,
    paddingTop: tokens.spacingVerticalS,
    paddingLeft: tokens.spacingHorizontalM,
    // The spreadsheet program lays its own menu over the top right corner.
    paddingRight: '40px',
    borderBottom: `1px solid ${tokens.colorNeutralStroke2}`,
  },
  title: {
    margin: 0,
    fontSize: tokens.fontSizeBase400,
    fontWeight: tokens.fontWeightSemibold,
    lineHeight: tokens.lineHeightBase400,
  },
  main: {
    flexGrow: 1,
    overflowY: 'auto',
    padding: `${tokens.spacingVerticalM} ${tokens.spacingHorizontalM}`,
  },
  bar: {
    display: 'flex',
    flexDirection: 'column',
    gap: tokens.spacingVerticalXS,
    padding: `${tokens.spacingVerticalS} ${tokens.spacingHorizontalM}`,
    borderTop: `1px solid ${tokens.colorNeutralStroke2}`,
  },
  stack: { display: 'flex', flexDirection: 'column', gap: tokens.spacingVerticalM },
  tightStack: { display: 'flex', flexDirection: 'column', gap: tokens.spacingVerticalXS },
  row: { display: 'flex', flexWrap: 'wrap', alignItems: 'center', gap: tokens.spacingHorizontalS },
  grow: { flexGrow: 1, minWidth: 0 },
  section: { display: 'flex', flexDirection: 'column', gap: tokens.spacingVerticalS },
  heading: {
    margin: 0,
    fontSize: tokens.fontSizeBase300,
    fontWeight: tokens.fontWeightSemibold,
    lineHeight: tokens.lineHeightBase300,
  },
  gloss: { color: tokens.colorNeutralForeground2, fontSize: tokens.fontSizeBase200 },
  breakable: { overflowWrap: 'anywhere' },
  question: {
    display: 'flex',
    flexDirection: 'column',
    gap: tokens.spacingVerticalS,
    padding: tokens.spacingHorizontalM,
    border: `1px solid ${tokens.colorNeutralStrokeAccessible}`,
    borderRadius: tokens.borderRadiusMedium,
  },
  list: {
    listStyleType: 'none',
    margin: 0,
    padding: 0,
    display: 'flex',
    flexDirection: 'column',
    gap: tokens.spacingVerticalS,
  },
  figure: {
    fontSize: tokens.fontSizeHero700,
    lineHeight: tokens.lineHeightHero700,
    fontWeight: tokens.fontWeightSemibold,
    overflowWrap: 'anywhere',
  },
  table: {
    overflowY: 'auto',
    maxHeight: '320px',
    border: `1px solid ${tokens.colorNeutralStroke2}`,
    borderRadius: tokens.borderRadiusMedium,
    '&:focus-visible': { outline: `2px solid ${tokens.colorStrokeFocus2}`, outlineOffset: '1px' },
  },
  tableHead: {
    position: 'sticky',
    top: 0,
    zIndex: 1,
    backgroundColor: tokens.colorNeutralBackground2,
    borderBottom: `1px solid ${tokens.colorNeutralStroke1}`,
  },
  tableLine: {
    display: 'grid',
    gridTemplateColumns: 'minmax(0, 1fr) 84px 84px',
    columnGap: tokens.spacingHorizontalXS,
    alignItems: 'center',
    padding: `0 ${tokens.spacingHorizontalS}`,
    boxSizing: 'border-box',
  },
  bodyLine: {
    height: `${lineHeight}px`,
    cursor: 'pointer',
    borderBottom: `1px solid ${tokens.colorNeutralStroke3}`,
    '&:hover': { backgroundColor: tokens.colorNeutralBackground1Hover },
  },
  activeLine: {
    outline: `2px solid ${tokens.colorStrokeFocus2}`,
    outlineOffset: '-2px',
  },
  clipped: { overflow: 'hidden', textOverflow: 'ellipsis', whiteSpace: 'nowrap' },
  figureCell: { textAlign: 'right', fontVariantNumeric: 'tabular-nums' },
  sortButton: {
    minWidth: 0,
    width: '100%',
    padding: '4px 0',
    fontSize: tokens.fontSizeBase200,
    fontWeight: tokens.fontWeightSemibold,
  },
  sortRight: { justifyContent: 'flex-end', textAlign: 'right' },
  sortLeft: { justifyContent: 'flex-start', textAlign: 'left' },
  visuallyHidden: {
    position: 'absolute',
    width: '1px',
    height: '1px',
    overflow: 'hidden',
    clipPath: 'inset(50%)',
    whiteSpace: 'nowrap',
  },
});
