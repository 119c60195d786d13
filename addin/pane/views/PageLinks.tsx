/**
 * The ways to the pages of help and privacy, which open outside the pane.
 */
import { Link } from '@fluentui/react-components';
import type { ReactNode } from 'react';
import { paneTexts } from '../../wording/pane-texts';
import { usePaneStyles } from './pane-styles';

export function PageLinks(): ReactNode {
  const styles = usePaneStyles();
  return (
    <nav className={styles.row} aria-label={paneTexts.pages}>
      <Link inline href="support.html" target="_blank" rel="noopener">
        {paneTexts.support}
      </Link>
      <Link inline href="privacy.html" target="_blank" rel="noopener">
        {paneTexts.privacy}
      </Link>
    </nav>
  );
}
