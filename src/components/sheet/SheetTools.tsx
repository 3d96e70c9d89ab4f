import { useEffect, useState } from 'react';
import { paths } from '../../paths';
import { Button } from '../ui/Button';

type Keeping = 'unknown' | 'kept' | 'cannot';

const WORDS: Record<Keeping, string> = {
  unknown: '',
  kept: 'Kept on this device: opens without a connection, until you sign out.',
  cannot: 'This browser does not keep it for offline use. Print it.',
};

/** Print, and whether the sheet is kept on the device; keeping it begins here. */
export function SheetTools() {
  const [keeping, setKeeping] = useState<Keeping>('unknown');
  useEffect(() => {
    let gone = false;
    keepThisSheet().then(
      (kept) => !gone && setKeeping(kept ? 'kept' : 'cannot'),
      () => !gone && setKeeping('cannot'),
    );
    return () => {
      gone = true;
    };
  }, []);
  return (
    <>
      <Button icon="printer" onClick={() => window.print()}>
        Print
      </Button>
      <span className="label" role="status">
        {WORDS[keeping]}
      </span>
    </>
  );
}

const LONGEST_WAIT_MS = 20_000;

/** Starts the keeper of sheets and gives it this one with its files. False where there is none. */
async function keepThisSheet(): Promise<boolean> {
  if (!('serviceWorker' in navigator) || !import.meta.env.PROD) return false;
  const { serviceWorker } = navigator;
  // The keeper has seen this page when it was there before it, and the address is the plain one.
  const fresh = serviceWorker.controller !== null && location.search === '';
  await serviceWorker.register(paths.sheetKeeper, {
    scope: paths.sheetKeeperScope,
    updateViaCache: 'none',
  });
  const { active } = await serviceWorker.ready;
  if (!active) return false;
  if (document.readyState !== 'complete') {
    await new Promise((resolve) => window.addEventListener('load', resolve, { once: true }));
  }
  const files = [...performance.getEntriesByType('resource').map(({ name }) => name), ...linked()];
  return new Promise((resolve) => {
    const channel = new MessageChannel();
    channel.port1.onmessage = (event: MessageEvent<{ kept: boolean }>) => resolve(event.data.kept);
    setTimeout(() => resolve(false), LONGEST_WAIT_MS);
    active.postMessage({ keep: location.pathname, fresh, files: [...new Set(files)] }, [
      channel.port2,
    ]);
  });
}

/** Files that the page names, whether or not the browser had to fetch them. */
function linked(): string[] {
  return [
    ...document.querySelectorAll<HTMLLinkElement>('link[rel~="stylesheet"], link[rel~="preload"]'),
  ]
    .map(({ href }) => href)
    .concat([...document.querySelectorAll<HTMLScriptElement>('script[src]')].map(({ src }) => src));
}
