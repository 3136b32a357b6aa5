import { useOpenLostFixes } from './use-lanes';

/** Open lost fixes beside their page's name; those under a mount point's count with it. */
export function LostFixCount() {
  const count = [...useOpenLostFixes().values()].filter(({ sharedId }) => sharedId === null).length;
  if (count === 0) return null;
  return (
    <span className="nav-count">
      {count}
      <span className="visually-hidden"> open</span>
    </span>
  );
}
