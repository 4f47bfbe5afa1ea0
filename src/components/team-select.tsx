import { useNavigate } from 'react-router-dom';
import type { Me } from '../../shared/contracts/account.js';
import { text } from '../../shared/text.js';
import { chooseTeam, chosenTeam } from '../lib/me.js';

/** The team in the top bar: its name, or a list where there are several. */
export function TeamSelect({ me }: { me: Me }) {
  const navigate = useNavigate();
  const team = chosenTeam(me);
  if (me.teams.length < 2) return <span className="truncate text-soft">{team?.name}</span>;
  return (
    <select
      aria-label={text.common.team}
      value={team?.id}
      onChange={(event) => {
        chooseTeam(event.target.value);
        void navigate(`/home?team=${event.target.value}`);
      }}
      className="min-h-(--control) max-w-full min-w-0 truncate rounded-control border border-edge bg-raised px-2"
    >
      {me.teams.map(({ id, name }) => (
        <option key={id} value={id}>
          {name}
        </option>
      ))}
    </select>
  );
}
