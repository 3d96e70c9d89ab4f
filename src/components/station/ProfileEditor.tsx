import { useState } from 'react';
import { profileUpdateSchema } from '../../domain/station/schema';
import { paths } from '../../paths';
import { CheckField, TextAreaField } from '../ui/Field';
import { IslandForm } from '../ui/IslandForm';
import { ProblemSummary } from '../ui/Notices';
import { SaveBar } from './SaveBar';
import { useEditor } from './useEditor';
import { fieldId } from './useSave';

interface Props {
  station: { id: string; version: number; note: string; listed: boolean };
}

/** What others read, and whether they find the station. */
export function ProfileEditor({ station }: Props) {
  const [note, setNote] = useState(station.note);
  const [listed, setListed] = useState(station.listed);
  const editor = useEditor({
    url: paths.api.stationProfile(station.id),
    schema: profileUpdateSchema,
    version: station.version,
  });
  return (
    <IslandForm
      noValidate
      className="form"
      onSubmit={(event) => {
        event.preventDefault();
        void editor.submit({ note, listed });
      }}
    >
      <ProblemSummary problems={editor.problems} />
      <CheckField
        id={fieldId('listed')}
        label="List the station"
        note="Others find it and can search common windows with it. Unlisted, only the crew sees it."
        checked={listed}
        onChange={(event) => {
          setListed(event.target.checked);
          editor.touch();
        }}
      />
      <TextAreaField
        id={fieldId('note')}
        label="Note for others"
        rows={6}
        value={note}
        onChange={(event) => {
          setNote(event.target.value);
          editor.touch();
        }}
        note={`How you like to be asked, what you listen on, what is being rebuilt. ${note.length} of 2000 characters.`}
        error={editor.errorOf('note')}
      />
      <SaveBar editor={editor} label="Save the profile" done="The profile is saved." />
    </IslandForm>
  );
}
