import './bench.css';
import { useCallback, useState } from 'react';
import { Link, useNavigate } from 'react-router-dom';
import { formatQuantity } from '../../../shared/quantities/index.ts';
import { Button, EmptyState, icons } from '../../components/index.ts';
import { paths } from '../../paths.ts';
import { Drawings } from './drawings/drawings.tsx';
import { FigureStrips } from './figures/figure-strips.tsx';
import { Warnings } from './figures/warnings.tsx';
import { driveOf, ListenPanel, toneOfDrive } from './listen/index.ts';
import { theSavedLinks } from './save/use-saved-links.ts';
import { sayInWords } from './shape/index.ts';
import { useCopyLink } from './share/use-copy-link.tsx';
import { useSharedWave } from './share/use-shared-wave.ts';
import { useTable } from '../../workers/use-table.ts';
import { sampleRateOf, type Wave } from './state/wave.ts';

/** A wave that a link carries: to be seen and heard, and put on the bench. */
export function SharedWavePage() {
  const shared = useSharedWave();
  if (shared === null) return <p className="drawings-wait">Reading the link…</p>;
  if ('fault' in shared) {
    return (
      <EmptyState title="This link cannot be read" actions={<Link to={paths.bench}>Go to the bench</Link>}>
        <p>{shared.fault}</p>
        <p>Ask for it again, and see that it arrives whole: some programs cut long links.</p>
      </EmptyState>
    );
  }
  return <SharedWave wave={shared.wave} />;
}

function SharedWave({ wave }: { wave: Wave }) {
  const built = useTable(wave.definition);
  const [playback, setPlayback] = useState(wave.playback);
  const { copyLink, linkDialog } = useCopyLink();
  const navigate = useNavigate();
  const open = useCallback(() => {
    theSavedLinks().open(({ exporting }) => ({ ...wave, exporting }), null);
    void navigate(paths.bench);
  }, [wave, navigate]);

  return (
    <div className="bench">
      <section className="bench-top" aria-label="About the wave">
        <header className="bench-head">
          <div className="basis-full">
            <p className="figure-note">A shared wave, read-only</p>
            <h1>{wave.definition.name}</h1>
          </div>
          <div className="bench-tools">
            <Button size="small" variant="primary" onPress={open}>
              Open on my bench
            </Button>
            <Button size="small" variant="quiet" icon={icons.link} onPress={() => copyLink(wave)}>
              Copy link
            </Button>
          </div>
        </header>
        <div className="space-y-4">
          <WaveFacts wave={{ ...wave, playback }} />
          <p className="figure-note">
            On your bench it can be changed and exported. What is there now comes back with Undo.
          </p>
          {built !== null && 'table' in built && (
            <ListenPanel table={built.table} playback={playback} onPlaybackChange={setPlayback} />
          )}
        </div>
      </section>
      <section className="bench-drawings" aria-labelledby="drawings-title">
        <h2 id="drawings-title" className="sr-only">
          Drawings and figures
        </h2>
        {built === null && <p className="drawings-wait">Building the table…</p>}
        {built !== null && 'fault' in built && <p className="drawings-wait">{built.fault}</p>}
        {built !== null && 'table' in built && (
          <>
            <Drawings table={built.table} sampleRateHz={sampleRateOf(playback, wave.definition.table)} />
            <Warnings warnings={built.table.warnings} />
            <FigureStrips table={built.table} />
          </>
        )}
      </section>
      {linkDialog}
    </div>
  );
}

const kept = {
  'full-span': 'full span',
  'mid-tread': 'mid-tread',
  'offset-binary': 'offset binary',
  'twos-complement': 'two’s complement',
} as const;

function noiseFact({ dither, seed, shaping }: Wave['definition']['table']): [string, string] {
  const dithered = dither === 'none' ? 'no dither' : `${dither} dither, seed ${seed}`;
  return ['Noise', `${dithered}, ${shaping === 0 ? 'no shaping' : `shaping of order ${shaping}`}`];
}

function sayPlayed(playback: Wave['playback'], table: Wave['definition']['table']): string {
  const drive = driveOf(playback, table);
  if (drive.kind === 'once') return 'once through';
  const how = drive.kind === 'loop' ? 'as a loop' : 'by a phase accumulator';
  return `${how} at ${formatQuantity(toneOfDrive(drive, table), 'Hz', { significant: 5 })}`;
}

function WaveFacts({ wave: { definition, playback } }: { wave: Wave }) {
  const { source, table, level } = definition;
  const facts: readonly [string, string][] = [
    ['Made of', sayInWords(source)],
    ['Table', `${table.length} entries of ${table.bits} ${table.bits === 1 ? 'bit' : 'bits'}`],
    ['Cycles in the table', String(table.cycles)],
    [
      'Codes',
      `${table.range}, ${kept[table.scale]}, ${kept[table.coding]}${table.complement ? ', inverted' : ''}`,
    ],
    ['Rounding', table.rounding.replace('-', ' ')],
    ...(table.dither === 'none' && table.shaping === 0 ? [] : [noiseFact(table)]),
    ...(table.levels === undefined
      ? []
      : [['Measured levels', `${table.levels.length} voltages`] as [string, string]]),
    ...(table.fold === 'none' ? [] : [['Stored', 'the first quarter'] as [string, string]]),
    ['Level', `${level.level} of full scale, normalised: ${level.normalise}`],
    ['Sampled at the', `step’s ${table.sampleAt}, from ${table.startPhaseDeg}°`],
    ['Played', sayPlayed(playback, table)],
    ['Sample rate', formatQuantity(sampleRateOf(playback, table), 'Hz', { significant: 5 })],
  ];
  return (
    <dl className="wave-facts">
      {facts.map(([what, is]) => (
        <div key={what}>
          <dt>{what}</dt>
          <dd>{is}</dd>
        </div>
      ))}
    </dl>
  );
}
