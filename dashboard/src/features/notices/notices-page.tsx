import { Button, Checkbox, Input, MessageBar, MessageBarBody } from '@fluentui/react-components';
import {
  noticeRules,
  noticeSubjectWords,
  noticeSubjects,
  noticeWayWords,
  noticeWays,
  type NoticeRule,
  type NoticeSubject,
  type NoticeWay,
} from '@hubtack/contracts/notices/notice.js';
import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { ListPage } from '../../components/list-page';
import { noticeRulesQuery, useChangeNoticeRules, useDefaultNoticeRules } from '../../lib/notices';
import { DeviceWays } from './device-ways';
import { SheetsByMail } from './sheets-by-mail';
import './notices.css';

type Typed = Map<string, string>;
const keyOf = (subject: NoticeSubject, way: NoticeWay) => `${subject} ${way}`;
const typedOf = (rules: readonly NoticeRule[]): Typed =>
  new Map(rules.map(({ subject, way, afterMinutes }) => [keyOf(subject, way), String(afterMinutes)]));

/** What I am told of, which way, and after how many minutes. */
export default function NoticesPage() {
  const query = useQuery(noticeRulesQuery);
  return (
    <ListPage title="Notices" what="your notices" query={query}>
      {(rules) => (
        <>
          <DeviceWays />
          <SheetsByMail />
          <RulesTable key={JSON.stringify(rules)} rules={rules} />
        </>
      )}
    </ListPage>
  );
}

function RulesTable({ rules }: { rules: readonly NoticeRule[] }) {
  const [typed, setTyped] = useState(() => typedOf(rules));
  const change = useChangeNoticeRules();
  const back = useDefaultNoticeRules();
  const wanted = [...typed].map(([key, minutes]) => {
    const [subject, way] = key.split(' ');
    return { subject, way, afterMinutes: minutes.trim() === '' ? NaN : Number(minutes) };
  });
  const read = noticeRules.safeParse(wanted);
  const set = (key: string, minutes: string | null) =>
    setTyped((before) => {
      const next = new Map(before);
      if (minutes === null) next.delete(key);
      else next.set(key, minutes);
      return next;
    });
  return (
    <form
      onSubmit={(event) => {
        event.preventDefault();
        if (read.success) change.mutate(read.data);
      }}
    >
      <div className="notice-scroll">
        <table className="data-table notice-table" aria-label="What I am told of">
          <thead>
            <tr>
              <th scope="col">After so many minutes</th>
              {noticeWays.map((way) => (
                <th key={way} scope="col">
                  {noticeWayWords[way]}
                </th>
              ))}
            </tr>
          </thead>
          <tbody>
            {noticeSubjects.map((subject) => (
              <tr key={subject}>
                <th scope="row">{noticeSubjectWords[subject]}</th>
                {noticeWays.map((way) => (
                  <td key={way} data-name={noticeWayWords[way]}>
                    <RuleCell
                      label={`${noticeSubjectWords[subject]}, ${noticeWayWords[way]}`}
                      minutes={typed.get(keyOf(subject, way)) ?? null}
                      onChange={(minutes) => set(keyOf(subject, way), minutes)}
                    />
                  </td>
                ))}
              </tr>
            ))}
          </tbody>
        </table>
      </div>
      {!read.success && <p role="alert">Write whole minutes from 0 to 480.</p>}
      {(change.error ?? back.error) && (
        <MessageBar intent="error">
          <MessageBarBody>{(change.error ?? back.error)!.message}</MessageBarBody>
        </MessageBar>
      )}
      <div className="notice-buttons">
        <Button appearance="primary" type="submit" disabled={!read.success || change.isPending}>
          Save
        </Button>
        <Button disabled={back.isPending} onClick={() => back.mutate()}>
          As usual for my role
        </Button>
        {change.isSuccess && <span role="status">Saved.</span>}
      </div>
    </form>
  );
}

interface RuleCellProps {
  label: string;
  /** Null: not told. */
  minutes: string | null;
  onChange: (minutes: string | null) => void;
}

function RuleCell({ label, minutes, onChange }: RuleCellProps) {
  return (
    <span className="rule-cell">
      <Checkbox
        aria-label={label}
        checked={minutes !== null}
        onChange={(_, { checked }) => onChange(checked === true ? '0' : null)}
      />
      {minutes !== null && (
        <Input
          aria-label={`Minutes: ${label}`}
          inputMode="numeric"
          value={minutes}
          onChange={(_, { value }) => onChange(value)}
        />
      )}
    </span>
  );
}
