import { Notice } from '../ui/notice';

/** Said while the server cannot be asked whether what is shown still holds. */
export function NoConnection() {
  return (
    <Notice kind="waiting" title="No connection to the server." live={false}>
      What is shown here may be out of date. A record is kept only when the page says “Recorded”.
    </Notice>
  );
}
