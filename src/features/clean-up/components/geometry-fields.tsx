import { useState } from 'react';
import { Button } from '#client/components/button.tsx';
import { NumberField } from '#client/components/field.tsx';
import { enteredText } from '#client/lib/figures.ts';
import { parseTypedNumber } from '#client/lib/parse-number.ts';
import { cleanUpText as text } from '#client/text/clean-up.ts';
import type { RenditionSettings } from '#shared/contract/renditions.ts';
import { type Setting, turnedBy, turnedTo } from '../model/handles.ts';

const SETTINGS: readonly Setting[] = ['level', 'corners', 'crop'];
const DECIMALS = 1000;

type GeometryFieldsProps = {
  settings: RenditionSettings;
  setting: Setting | null;
  /** True when the handles last applied said nothing that can be done. */
  refused: boolean;
  onSettings: (settings: RenditionSettings) => void;
  onSetting: (setting: Setting | null) => void;
  onApply: () => void;
};

/** Turn, straighten, rectify and crop. While handles are set, what they will do and a way out. */
export function GeometryFields(props: GeometryFieldsProps) {
  const { settings, setting, onSettings, onSetting } = props;
  return (
    <fieldset className="m-0 flex flex-col gap-3 border-0 p-0">
      <legend className="mb-2 text-md font-bold">{text.geometry}</legend>
      {setting === null ? (
        <>
          <div className="flex flex-wrap gap-2">
            <Button look="quiet" onClick={() => onSettings(turnedBy(settings, -90))}>
              {text.turnLeft}
            </Button>
            <Button look="quiet" onClick={() => onSettings(turnedBy(settings, 90))}>
              {text.turnRight}
            </Button>
          </div>
          <TurnField
            key={settings.turnDeg}
            turnDeg={settings.turnDeg}
            onTurn={(turnDeg) => onSettings(turnedTo(settings, turnDeg))}
          />
          <div className="flex flex-col items-start gap-2">
            {SETTINGS.map((each) => (
              <Button key={each} look="quiet" onClick={() => onSetting(each)}>
                {text.settings[each]}
              </Button>
            ))}
            {settings.corners === null ? null : (
              <>
                <Button look="text" onClick={() => onSettings({ ...settings, corners: null, crop: null })}>
                  {text.remove.corners}
                </Button>
                <p className="m-0 text-sm text-ink-2">{text.photographNote}</p>
              </>
            )}
            {settings.crop === null ? null : (
              <Button look="text" onClick={() => onSettings({ ...settings, crop: null })}>
                {text.remove.crop}
              </Button>
            )}
          </div>
        </>
      ) : (
        <HandleSteps {...props} setting={setting} />
      )}
    </fieldset>
  );
}

function HandleSteps({ setting, refused, onSetting, onApply }: GeometryFieldsProps & { setting: Setting }) {
  return (
    <div className="flex flex-col gap-2">
      <p className="m-0 font-semibold">{text.settings[setting]}</p>
      <p className="m-0">
        {text.settingLeads[setting]} {text.handleHelp}
      </p>
      {refused ? (
        <p role="alert" className="m-0 text-wrong">
          {text.refused[setting]}
        </p>
      ) : null}
      <div className="flex flex-wrap gap-2">
        <Button onClick={onApply}>{text.apply[setting]}</Button>
        <Button look="quiet" onClick={() => onSetting(null)}>
          {text.cancel}
        </Button>
      </div>
    </div>
  );
}

function TurnField({ turnDeg, onTurn }: { turnDeg: number; onTurn: (turnDeg: number) => void }) {
  const shown = Math.round(turnDeg * DECIMALS) / DECIMALS;
  const [typed, setTyped] = useState(enteredText(shown));
  const parsed = parseTypedNumber(typed);
  const isRight = parsed !== null && Math.abs(parsed) <= 180;
  const use = () => isRight && parsed !== shown && onTurn(parsed);
  return (
    <NumberField
      label={text.turn}
      unit="°"
      hint={text.turnHint}
      error={isRight ? null : text.turnWrong}
      value={typed}
      onChange={(event) => setTyped(event.target.value)}
      onBlur={use}
      onKeyDown={(event) => event.key === 'Enter' && use()}
    />
  );
}
