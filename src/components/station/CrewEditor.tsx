import { useState } from 'react';
import { crewInvitationSchema } from '../../domain/station/schema';
import type { CrewMember, CrewRole, StationCrew } from '../../domain/station/views';
import { formatDay } from '../../domain/time/format';
import { paths } from '../../paths';
import { Button } from '../ui/Button';
import { Dialog } from '../ui/Dialog';
import { SelectField, TextField } from '../ui/Field';
import { IslandForm } from '../ui/IslandForm';
import { ProblemSummary } from '../ui/Notices';
import { Toast } from '../ui/Toast';
import { fieldId, sendJson, useSave } from './useSave';

interface Props {
  station: { id: string; callSign: string };
  crew: StationCrew;
  keeper: boolean;
}

const ROLE_WORDS: Record<CrewRole, string> = {
  keeper: 'Keeper: changes the station, answers for it',
  operator: 'Operator: answers for the station',
};

/** Who keeps the station and who answers for it. */
export function CrewEditor({ station, crew: first, keeper }: Props) {
  const [crew, setCrew] = useState(first);
  const [problem, setProblem] = useState<string | null>(null);
  const [leaving, setLeaving] = useState<CrewMember | null>(null);
  const [done, setDone] = useState<string | null>(null);

  const reload = async () => {
    const response = await fetch(paths.api.stationCrew(station.id));
    if (response.ok) setCrew((await response.json()) as StationCrew);
  };
  const act = async (
    method: 'PUT' | 'DELETE',
    url: string,
    body: object | undefined,
    said: string,
  ) => {
    const answer = await sendJson(method, url, body);
    setProblem(answer.ok ? null : answer.message);
    if (answer.ok) setDone(said);
    await reload();
  };
  const remove = async (member: CrewMember) => {
    setLeaving(null);
    const url = paths.api.stationCrewMember(station.id, member.personId);
    if (!member.isViewer) {
      await act('DELETE', url, undefined, `${member.name} is no longer in the crew.`);
      return;
    }
    const answer = await sendJson('DELETE', url);
    if (answer.ok) window.location.assign(paths.stations);
    else setProblem(answer.message);
  };

  return (
    <div className="columns columns--margin">
      <div className="stack">
        <ProblemSummary
          title="Nothing was changed"
          problems={problem ? [{ message: problem }] : []}
        />
        <table className="table--cards table">
          <thead>
            <tr>
              <th scope="col">Name</th>
              {keeper ? <th scope="col">Mail</th> : null}
              <th scope="col">In the crew as</th>
              <th scope="col">
                <span className="sr-only">Remove</span>
              </th>
            </tr>
          </thead>
          <tbody>
            {crew.members.map((member) => (
              <tr key={member.personId}>
                <th scope="row" data-label="Name">
                  {member.name}
                  {member.isViewer ? ' (you)' : ''}
                </th>
                {keeper ? (
                  <td data-label="Mail">
                    <span className="break-all">{member.email}</span>
                  </td>
                ) : null}
                <td data-label="As">
                  {keeper ? (
                    <select
                      className="field__control w-36!"
                      aria-label={`${member.name} is in the crew as`}
                      value={member.crewRole}
                      onChange={(event) =>
                        void act(
                          'PUT',
                          paths.api.stationCrewMember(station.id, member.personId),
                          { crewRole: event.target.value },
                          `${member.name} is ${event.target.value === 'keeper' ? 'a keeper' : 'an operator'} now.`,
                        )
                      }
                    >
                      <option value="keeper">keeper</option>
                      <option value="operator">operator</option>
                    </select>
                  ) : (
                    member.crewRole
                  )}
                </td>
                <td className="text-right max-sm:justify-end!">
                  {keeper || member.isViewer ? (
                    <Button look="bare" onClick={() => setLeaving(member)}>
                      {member.isViewer ? 'Leave' : 'Remove'}
                      {member.isViewer ? null : <span className="sr-only"> {member.name}</span>}
                    </Button>
                  ) : null}
                </td>
              </tr>
            ))}
          </tbody>
        </table>
        {crew.invitations.length > 0 ? (
          <div className="stack ruled">
            <h2>Invited, not here yet</h2>
            <ul className="m-0 list-none p-0">
              {crew.invitations.map((invitation) => (
                <li key={invitation.id} className="row justify-between border-b border-rule py-2">
                  <span className="min-w-0">
                    <span className="break-all">{invitation.email}</span>{' '}
                    <span className="quiet">
                      as {invitation.crewRole}, until {formatDay(invitation.expiresMs)} UTC
                    </span>
                  </span>
                  <Button
                    look="bare"
                    onClick={() =>
                      void act(
                        'DELETE',
                        paths.api.stationInvitation(station.id, invitation.id),
                        undefined,
                        `The invitation of ${invitation.email} is withdrawn.`,
                      )
                    }
                  >
                    Withdraw<span className="sr-only"> the invitation of {invitation.email}</span>
                  </Button>
                </li>
              ))}
            </ul>
          </div>
        ) : null}
      </div>
      {keeper ? (
        <InviteForm
          stationId={station.id}
          onInvited={(email) => {
            setDone(`An invitation is on its way to ${email}.`);
            void reload();
          }}
        />
      ) : (
        <p className="quiet">A keeper invites people and changes what they may do.</p>
      )}
      <Dialog
        open={leaving !== null}
        title={
          leaving?.isViewer
            ? `Leave the crew of ${station.callSign}?`
            : `Remove ${leaving?.name ?? ''} from the crew?`
        }
        onClose={() => setLeaving(null)}
      >
        <p>Agreed skeds stay as they are. Coming back needs a new invitation.</p>
        <div className="row">
          <Button look="harmful" onClick={() => leaving && void remove(leaving)}>
            {leaving?.isViewer ? 'Leave the crew' : 'Remove from the crew'}
          </Button>
          <Button onClick={() => setLeaving(null)}>Keep the crew as it is</Button>
        </div>
      </Dialog>
      {done ? <Toast message={done} onDone={() => setDone(null)} /> : null}
    </div>
  );
}

function InviteForm({
  stationId,
  onInvited,
}: {
  stationId: string;
  onInvited: (email: string) => void;
}) {
  const [email, setEmail] = useState('');
  const [crewRole, setCrewRole] = useState<CrewRole>('operator');
  const { save, saving, problems, errorOf } = useSave<{ id: string }>(
    'POST',
    paths.api.stationInvitations(stationId),
    crewInvitationSchema,
  );
  const submit = async () => {
    if (!(await save({ email, crewRole }))) return;
    onInvited(email.trim());
    setEmail('');
  };
  return (
    <IslandForm
      noValidate
      className="stack"
      onSubmit={(event) => {
        event.preventDefault();
        void submit();
      }}
    >
      <h2>Invite somebody</h2>
      <ProblemSummary title="Nobody was invited" problems={problems} />
      <TextField
        id={fieldId('email')}
        label="Mail address"
        type="email"
        autoComplete="off"
        value={email}
        onChange={(event) => setEmail(event.target.value)}
        note="They get a mail with a link that is good for 14 days."
        error={errorOf('email')}
      />
      <SelectField
        id={fieldId('crewRole')}
        label="As"
        value={crewRole}
        onChange={(event) => setCrewRole(event.target.value as CrewRole)}
      >
        {Object.entries(ROLE_WORDS).map(([value, text]) => (
          <option key={value} value={value}>
            {text}
          </option>
        ))}
      </SelectField>
      <div>
        <Button type="submit" look="filled" disabled={saving}>
          Send the invitation
        </Button>
      </div>
    </IslandForm>
  );
}
