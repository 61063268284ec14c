/**
 * Renewal of the short access token. The refresh token works once, so two tabs must not use it
 * together: a lock shared by the tabs, and the time of the last renewal, see to that.
 */
const RENEWED_AT = 'tetherline.renewed-at';

let running: Promise<boolean> | null = null;

async function renew(sentAt: number): Promise<boolean> {
  // Another tab renewed after the refused request was sent: its cookies are ours too.
  if (Number(localStorage.getItem(RENEWED_AT) ?? 0) > sentAt) return true;
  try {
    const response = await fetch('/api/refresh', { method: 'POST', credentials: 'same-origin' });
    if (response.ok) localStorage.setItem(RENEWED_AT, String(Date.now()));
    return response.ok;
  } catch (error) {
    // No connection: the refused request is answered as refused, and the page says so.
    console.error(error);
    return false;
  }
}

/** True when requests may be tried again. Calls that come together share one renewal. */
export function refreshOnce(sentAt: number): Promise<boolean> {
  running ??= (
    navigator.locks
      ? navigator.locks.request('tetherline-renew', () => renew(sentAt))
      : renew(sentAt)
  ).finally(() => {
    running = null;
  });
  return running;
}

/** Kept when somebody signs in: the token is fresh. */
export function markRenewed(): void {
  localStorage.setItem(RENEWED_AT, String(Date.now()));
}

const DUE_MS = 4 * 60_000;

/** Renews before the token runs out, so that no request has to be refused first. */
export async function renewIfDue(): Promise<void> {
  const dueSince = Date.now() - DUE_MS;
  if (Number(localStorage.getItem(RENEWED_AT) ?? 0) < dueSince) await refreshOnce(dueSince);
}
