import './device.css';
import { useState } from 'react';
import { deviceKinds } from '../../../../../shared/listening/device-curves.ts';
import { Button, Explain, Notice, SelectField } from '../../../../components/index.ts';
import { useAsLive, useLive } from '../../../../live/index.ts';
import { Plot, createPlotLink } from '../../../../plots/index.ts';
import { useListening } from '../listening.tsx';
import { CurveTable } from './curve-table.tsx';
import { CurveText } from './curve-text.tsx';
import { deviceCurves, isChanged, restore, type Curve, type CurveId } from './curves.ts';
import { throughOf, useHeardThrough, type Through } from './heard-through.ts';
import { LevelThrough } from './level-through.tsx';
import { ResponseScene, type ResponseData } from './response-scene.ts';

const options: readonly { value: Through; label: string }[] = [
  { value: 'straight', label: 'Straight, as the browser plays it' },
  ...deviceKinds.map(({ id, name }) => ({ value: id, label: name })),
  { value: 'own', label: 'Own curve' },
];

/** Through what it is heard: a small piezo, a handset, a small cone, or a curve of one's own. */
export function DevicePanel() {
  const { device } = useListening();
  const curves = useLive(deviceCurves);
  const [through, setThrough] = useState<Through>(() => throughOf(device));
  const curve = through === 'straight' ? null : curves[through];
  useHeardThrough(through, curve);
  return (
    <>
      <SelectField
        label="Heard through"
        value={through}
        options={options}
        onChange={setThrough}
        aside={
          <Explain title="Heard through">
            <p>
              What is played goes through a filter with the curve’s levels: straight between its points over
              the logarithm of frequency, and the level of the end point beyond them. Its phase is the least
              that such a curve can have.
            </p>
            <p>
              The strongest point counts as 0 dB, so that no line is louder through it than without it. Your
              own loudspeaker or headphones come on top: use ones that reach further than the curve.
            </p>
          </Explain>
        }
      />
      {through !== 'straight' && curve !== null && <CurveParts id={through} curve={curve} />}
      {through === 'own' && <CurveText hasOwn={curve !== null} />}
    </>
  );
}

function CurveParts({ id, curve }: { id: CurveId; curve: Curve }) {
  const curves = useLive(deviceCurves);
  const kind = deviceKinds.find((one) => one.id === id);
  const isBehind = curve.typed !== curve.points;
  return (
    <>
      <Notice>
        <p>
          <strong>An approximation, no device’s data: replace it by the data sheet’s curve.</strong>{' '}
          {kind?.words ?? `${curve.name}: a curve says nothing of distortion, nor of how loud a device is.`}
        </p>
      </Notice>
      <ResponsePlot key={id} data={curve} />
      <LevelThrough points={curve.points} />
      <CurveTable key={`${id} points`} id={id} points={curve.typed} />
      {isBehind && (
        <p className="field-description" role="status">
          The drawing and the sound keep the last curve that was allowed.
        </p>
      )}
      {isChanged(curves, id) && (
        <div>
          <Button size="small" onPress={() => restore(id)}>
            Back to the curve it came with
          </Button>
        </div>
      )}
    </>
  );
}

function ResponsePlot({ data }: { data: ResponseData }) {
  const [scene] = useState(() => new ResponseScene(data));
  const [link] = useState(createPlotLink);
  return <Plot title="Response" kind="response" scene={scene} data={useAsLive(data)} link={link} />;
}
