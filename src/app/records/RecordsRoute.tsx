import { useEffect, useState } from 'preact/hooks';
import './records.css';
import { HandOverScreen } from './HandOverScreen.tsx';
import { LookAlikeScreen } from './LookAlikeScreen.tsx';
import { NotebookScreen } from './NotebookScreen.tsx';
import { RecordList } from './RecordList.tsx';
import { RecordScreen } from './RecordScreen.tsx';

/** "#/records", "#/records/new", "#/records/ID", "#/records/ID/hand-over", "#/records/ID/look-alikes". */
export function RecordsRoute() {
  const [hash, setHash] = useState(location.hash);
  useEffect(() => {
    const changed = () => setHash(location.hash);
    addEventListener('hashchange', changed);
    return () => removeEventListener('hashchange', changed);
  }, []);
  useEffect(() => scrollTo(0, 0), [hash]);
  const [, , id, screen] = hash.split('/');
  if (!id) return <RecordList />;
  if (id === 'new') return <NotebookScreen />;
  // A screen of its own for each record: nothing of the one before stays in its fields.
  if (screen === 'hand-over') return <HandOverScreen key={id} id={id} />;
  if (screen === 'look-alikes') return <LookAlikeScreen key={id} id={id} />;
  return <RecordScreen key={id} id={id} />;
}
