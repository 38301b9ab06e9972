import { useTeamStart } from '../../api/team-defaults.ts';
import { Button, IconButton, Menu, TextField, icons, useToast } from '../../components/index.ts';
import { Spot, useFieldProblem } from './problems/field-problem.tsx';
import { SavePart } from './save/save-part.tsx';
import { startsFor, type Start } from './save/starts.ts';
import { theSavedLinks } from './save/use-saved-links.ts';
import { changeDefinition, theBench, useBench, useDefinition } from './state/use-bench.ts';

/** Name of the wave and what can be done with the whole of it. */
export function BenchHead({ onCopyLink }: { onCopyLink: () => void }) {
  return (
    <header className="bench-head">
      <h1 className="sr-only">Bench</h1>
      <NameField />
      <SavePart />
      <div className="bench-tools">
        <Steps />
        <StartAnew />
        <Button size="small" variant="quiet" icon={icons.link} onPress={onCopyLink}>
          Copy link
        </Button>
      </div>
    </header>
  );
}

function NameField() {
  const name = useDefinition((definition) => definition.name);
  const problem = useFieldProblem('name');
  return (
    <Spot path="name">
      <TextField
        label="Name of the wave"
        value={name}
        onChange={(next) => changeDefinition((definition) => ({ ...definition, name: next }), 'name')}
        problem={problem}
      />
    </Spot>
  );
}

function Steps() {
  const canUndo = useBench(({ history }) => history.past.length > 0);
  const canRedo = useBench(({ history }) => history.future.length > 0);
  const { undo, redo } = theBench();
  return (
    <>
      <IconButton
        size="small"
        label="Undo"
        icon={icons.undo}
        onPress={undo}
        isDisabled={!canUndo}
        disabledReason="Nothing has been changed"
      />
      <IconButton
        size="small"
        label="Redo"
        icon={icons.redo}
        onPress={redo}
        isDisabled={!canRedo}
        disabledReason="Nothing has been undone"
      />
    </>
  );
}

function StartAnew() {
  const toast = useToast();
  const team = useTeamStart();
  const start = ({ title, begin }: Start) => {
    theSavedLinks().open(begin, null);
    toast({
      message: `${title} is on the bench. What was there comes back with Undo.`,
      action: { label: 'Undo', onPress: theBench().undo },
    });
  };
  return (
    <Menu
      label="Start anew"
      icon={icons.wave}
      items={startsFor(team).map((example) => ({
        id: example.id,
        label: `${example.title}: ${example.summary}`,
        onSelect: () => start(example),
      }))}
    >
      Start anew
    </Menu>
  );
}
