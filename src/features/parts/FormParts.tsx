import { useState } from 'react';
import { Button } from '../../components/Button';
import { NumberField } from '../../components/NumberField';
import { SectionHead } from '../../components/SectionHead';
import { TextButton } from '../../components/TextLink';
import { parseTypedNumber } from '../../lib/format';

function exposureFault(text: string): string | undefined {
  const number = parseTypedNumber(text);
  if (!number.ok) return 'An exposure is a number of seconds, like 30.';
  return number.value > 0 ? undefined : `An exposure is above 0: 30, not ${text}.`;
}

/** Buttons and fields. On this page pressing a button says which it was, so that none of them is dead. */
export function FormParts() {
  const [pressed, setPressed] = useState<string | null>(null);
  const [dial, setDial] = useState('301.7');
  const [retardance, setRetardance] = useState('86.9');
  const [exposure, setExposure] = useState('\u221230');
  const say = (what: string) => () => {
    setPressed(what);
  };
  return (
    <section aria-labelledby="forms">
      <SectionHead
        size="small"
        id="forms"
        note={<span role="status">{pressed === null ? '' : `Pressed: ${pressed}`}</span>}
      >
        Forms
      </SectionHead>
      <div className="mt-2 flex flex-wrap items-center gap-3.5">
        <Button kind="filled" onClick={say('Release version 15')}>
          Release version 15
        </Button>
        <Button onClick={say('Ask for changes')}>Ask for changes</Button>
        <Button className="outline-3 outline-offset-2 outline-beam" onClick={say('in focus')}>
          in focus
        </Button>
        <Button waitsFor="row 8 can’t be read">waits for row 8</Button>
        <Button kind="danger" onClick={say('Withdraw version 12')}>
          Withdraw version 12
        </Button>
        <TextButton className="ml-2" onClick={say('See the result')}>
          See the result
        </TextButton>
      </div>
      <div className="mt-5 grid gap-x-8 gap-y-4 sm:grid-cols-3">
        <NumberField
          label="dial, degrees"
          help="to 0.1°, from 0 to 359.9"
          value={dial}
          onChange={(event) => {
            setDial(event.currentTarget.value);
          }}
        />
        <NumberField
          label="retardance, degrees"
          value={retardance}
          onChange={(event) => {
            setRetardance(event.currentTarget.value);
          }}
        />
        <NumberField
          label="exposure, seconds"
          fault={exposureFault(exposure)}
          value={exposure}
          onChange={(event) => {
            setExposure(event.currentTarget.value);
          }}
        />
      </div>
    </section>
  );
}
