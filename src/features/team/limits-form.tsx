import { useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import {
  changeLimitSetSchema,
  createLimitSetSchema,
  type LimitSet,
  type VettingLimits,
} from '../../../shared/contract/index.ts';
import {
  changeLimitSet,
  createLimitSet,
  limitSetQueries,
  readCurrentLimitSet,
} from '../../api/limit-sets.ts';
import { newKey } from '../../api/new-key.ts';
import { ProblemError } from '../../api/problem-error.ts';
import { Button, TextField, useToast } from '../../components/index.ts';
import { Form } from '../../forms/form.tsx';
import { useSubmit } from '../../forms/use-submit.ts';
import { limitNames, limitWords, sayLimit } from '../../limits/index.ts';
import { noLimits, readLimits, typeLimits } from './limit-fields.ts';

interface LimitsFormProps {
  team: string;
  /** The limits to change; none where new ones are set. */
  set: LimitSet | null;
  /** Whether new ones are for a tag, or the general ones. */
  isForTag: boolean;
  onDone: () => void;
}

/** One text for each limit. A change that came second shows what stands there now and keeps what was typed. */
export function LimitsForm({ team, set, isForTag, onDone }: LimitsFormProps) {
  const [typed, setTyped] = useState(() => (set === null ? noLimits : typeLimits(set.limits)));
  const [tag, setTag] = useState('');
  const [theirs, setTheirs] = useState<LimitSet | null>(null);
  const [key, setKey] = useState(newKey);
  const queryClient = useQueryClient();
  const toast = useToast();
  const keeping = useSubmit(
    async (wanted: { tag?: string | null; limits: Record<string, unknown> }) => {
      const limits = wanted.limits as VettingLimits;
      try {
        if (set === null) await createLimitSet(team, { tag: isForTag ? tag : null, limits }, key);
        else await changeLimitSet(team, theirs ?? set, limits);
      } catch (error) {
        if (error instanceof ProblemError && error.status === 412)
          setTheirs(readCurrentLimitSet(error.current));
        throw error;
      }
      await queryClient.invalidateQueries({ queryKey: limitSetQueries.all(team) });
      toast({ message: 'These limits count from now on.', tone: 'good' });
      onDone();
    },
    set === null ? createLimitSetSchema : changeLimitSetSchema,
  );
  const send = () => {
    const limits = readLimits(typed);
    void keeping.submit(set === null ? { tag: isForTag ? tag : null, limits } : { limits });
  };
  return (
    <Form
      label="Limits"
      action={theirs === null ? 'Set these' : 'Set mine'}
      submitting={keeping}
      onSubmit={send}
      fields={['tag', ...limitNames.map((name) => `limits.${name}`)]}
      aside={
        theirs !== null && (
          <Button
            onPress={() => {
              void queryClient.invalidateQueries({ queryKey: limitSetQueries.all(team) });
              onDone();
            }}
          >
            Leave theirs
          </Button>
        )
      }
    >
      {set === null && isForTag && (
        <TextField
          label="Tag"
          description="These count for tables that have the tag, beside the general ones."
          autoComplete="off"
          value={tag}
          onChange={(text) => {
            setTag(text);
            setKey(newKey());
          }}
          problem={keeping.at('tag')}
        />
      )}
      <p className="quiet">What is left empty is not asked for.</p>
      <div className="field-pair">
        {limitNames.map((name) => {
          const { figure, bound, unit, explains } = limitWords[name];
          return (
            <TextField
              key={name}
              label={`${figure} ${bound}, ${unit}`}
              description={explains}
              isCode
              autoComplete="off"
              value={typed[name]}
              onChange={(text) => {
                setTyped({ ...typed, [name]: text });
                setKey(newKey());
              }}
              problem={keeping.at(`limits.${name}`)}
            />
          );
        })}
      </div>
      {theirs !== null && <Theirs limits={theirs.limits} />}
    </Form>
  );
}

function Theirs({ limits }: { limits: VettingLimits }) {
  return (
    <section className="slab slab-saffron" aria-label="Set by somebody else">
      <div className="notice-words">
        <p role="alert">
          <strong>Somebody else has changed these limits meanwhile.</strong> Nothing you typed is lost. They
          are now:
        </p>
        <LimitLines limits={limits} />
      </div>
    </section>
  );
}

/** Limits in words, one a line. */
export function LimitLines({ limits }: { limits: VettingLimits }) {
  return (
    <ul className="limit-lines">
      {limitNames.flatMap((name) => {
        const allowed = limits[name];
        return allowed === undefined ? [] : [<li key={name}>{sayLimit(name, allowed)}</li>];
      })}
    </ul>
  );
}
