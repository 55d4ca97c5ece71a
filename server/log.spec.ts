import {QueryFailedError} from 'typeorm';
import {makeLog} from './log';

const written = (write: (log: ReturnType<typeof makeLog>) => void): string => {
  let text = '';
  write(makeLog('info', {write: (line) => void (text += line)}));
  return text;
};

describe('the log', () => {
  it('leaves secrets out, two levels deep', () => {
    const text = written((log) =>
      log.info({
        password: 'one',
        body: {password: 'two', name: 'kept'},
        req: {headers: {cookie: 'three', authorization: 'four'}},
        invitation: {token: 'five'},
      }),
    );

    expect(text).not.toMatch(/one|two|three|four|five/);
    expect(text).toContain('"name":"kept"');
  });

  it('tells of a failed query what it was, and nothing that was in it', () => {
    const cause = Object.assign(new Error('duplicate key'), {
      code: '23505',
      constraint: 'person_email_key',
      detail: 'Key (email)=(ann@people.example) already exists.',
    });
    const error = new QueryFailedError('insert into person values ($1)', ['its hash'], cause);

    const text = written((log) => log.error({err: error}, 'failed'));

    expect(text).toContain('insert into person values ($1)');
    expect(text).toContain('person_email_key');
    expect(text).not.toMatch(/its hash|ann@people/);
  });

  it('tells the cause of an error', () => {
    const error = new Error('outside', {cause: new Error('inside')});

    expect(written((log) => log.error({err: error}))).toContain('inside');
  });
});
