import type { LoadLogDto } from '@stayledger/shared/contracts/load-logs';
import type { PositionDto } from '@stayledger/shared/contracts/rig';
import { useState } from 'react';
import { Attention } from '../../components/feedback/attention';
import { PlainButton } from '../../components/plain-button/plain-button';
import { newIdempotencyKey } from '../../lib/api-client';
import { FileDrop } from './file-drop';
import { useRecountLoadLog } from './load-logs.mutations';
import { draftMapping, draftOfMapping, draftProblems, mappingOf, type DraftProblem } from './mapping-draft';
import { MappingForm } from './mapping-form';
import { recogniseFile, type RecognisedFile } from './recognise-file';

interface RecountFormProps {
  log: LoadLogDto;
  positions: readonly PositionDto[];
  zone: string;
}

/** Reads the file that is already on the server again, with another mapping. */
export function RecountForm({ log, positions, zone }: RecountFormProps) {
  const [draft, setDraft] = useState(() => draftOfMapping(log.mapping, []));
  const [recognised, setRecognised] = useState<RecognisedFile | null>(null);
  const [problems, setProblems] = useState<DraftProblem[]>([]);
  const [complaint, setComplaint] = useState<string | null>(null);
  const [idempotencyKey, setIdempotencyKey] = useState(newIdempotencyKey);
  const recount = useRecountLoadLog(log.id);
  const labelOf = (id: string): string =>
    positions.find((position) => position.id === id)?.label ?? 'this position';

  async function lookAgain(file: File): Promise<void> {
    setComplaint(null);
    try {
      const found = await recogniseFile(file);
      const positionIds = positions.map((position) => position.id);
      setRecognised(found);
      setDraft(draftMapping(found.log, log.mapping.channels, positionIds));
    } catch (error) {
      setComplaint(error instanceof Error ? error.message : 'The file cannot be read. Choose it again.');
    }
  }
  function send(): void {
    const found = draftProblems(draft, labelOf);
    setProblems(found);
    if (found.length > 0) return;
    recount.mutate(
      { version: log.version, mapping: mappingOf(draft), idempotencyKey },
      // The next wish is another one, also when this one was refused.
      { onSettled: () => setIdempotencyKey(newIdempotencyKey()) },
    );
  }
  return (
    <section aria-label="Read the file again">
      <h2>Read it again with another mapping</h2>
      <p>The file is already here; nothing is uploaded again.</p>
      {recognised === null && (
        <FileDrop
          label="To see all its columns, choose the file on your disk"
          hint="It is only looked at in this browser. Leave this out to correct the columns below."
          onFile={(file) => void lookAgain(file)}
        />
      )}
      {complaint !== null && <Attention role="alert">{complaint}</Attention>}
      <MappingForm
        draft={draft}
        onChange={setDraft}
        positions={positions}
        zone={zone}
        firstValues={recognised?.firstValues ?? new Map()}
        columnDoubts={recognised?.columnDoubts ?? new Map()}
        firstTime={recognised?.firstTime ?? null}
        problems={problems}
      />
      {problems.length > 0 && (
        <Attention role="alert">
          {problems.length === 1 ? 'One thing is' : `${problems.length} things are`} still missing above.
        </Attention>
      )}
      {recount.isError && <Attention role="alert">{recount.error.message}</Attention>}
      <PlainButton weight="primary" onClick={send} disabled={recount.isPending}>
        {recount.isPending ? 'Sending…' : 'Count again'}
      </PlainButton>
    </section>
  );
}
