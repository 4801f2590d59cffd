import type { ErrorRequestHandler, RequestHandler, Response } from 'express';
import type { ZodError } from 'zod';
import type { Problem } from '../../shared/contracts';

/** An answer other than success, told as problem details (RFC 9457). */
export class HttpProblem extends Error {
  constructor(
    readonly status: number,
    readonly code: string,
    title: string,
    readonly more: Pick<Problem, 'detail' | 'fields'> = {},
  ) {
    super(title);
  }
}

/** The thing asked for is not there, or belongs to another team: the same answer for both. */
export const notFound = (what: string): HttpProblem =>
  new HttpProblem(404, 'not-found', `There is no such ${what}.`);

/** What was sent does not follow its contract; `fields` says where. */
export function invalid(error: ZodError): HttpProblem {
  const fields = error.issues.map((issue) => ({ path: issue.path.join('.'), message: issue.message }));
  return invalidFields(fields);
}

/** Fields that are well formed but can't be taken as they are. */
export const invalidFields = (fields: { path: string; message: string }[]): HttpProblem =>
  new HttpProblem(422, 'invalid', 'Some of this can’t be taken as it is.', {
    detail: fields.map(({ path, message }) => (path ? `${path}: ${message}` : message)).join(' '),
    fields,
  });

export function sendProblem(response: Response, problem: HttpProblem): void {
  const body: Problem = {
    type: `urn:tenthmark:problem:${problem.code}`,
    title: problem.message,
    status: problem.status,
    code: problem.code,
    ...problem.more,
  };
  response.status(problem.status).type('application/problem+json').send(JSON.stringify(body));
}

export const unknownApiPath: RequestHandler = (request) => {
  throw new HttpProblem(
    404,
    'not-found',
    `There is nothing at ${request.method} ${request.baseUrl}${request.path}.`,
  );
};

/** Errors of the body readers (body-parser, multer), by what they call themselves. */
function fromReader(error: {
  type?: unknown;
  code?: unknown;
  status?: unknown;
  message?: unknown;
}): HttpProblem | null {
  if (error.type === 'entity.too.large')
    return new HttpProblem(413, 'too-large', 'The request is larger than the server takes (1 MB).');
  if (error.code === 'LIMIT_FILE_SIZE')
    return new HttpProblem(
      413,
      'file-too-large',
      'A file is larger than 200 MB. Split it, or log less often.',
    );
  if (error.code === 'LIMIT_FILE_COUNT')
    return new HttpProblem(
      413,
      'too-many-files',
      'At most 200 files at a time. Send the rest in a second drop.',
    );
  if (typeof error.code === 'string' && error.code.startsWith('LIMIT_'))
    return new HttpProblem(422, 'malformed', 'The upload has parts that are not expected.');
  if (typeof error.status === 'number' && error.status >= 400 && error.status < 500)
    return new HttpProblem(error.status, 'malformed', 'The request can’t be read.');
  return null;
}

/** The one place where errors become answers. What is not foreseen is logged whole and told as a number to quote. */
export function problemHandler(report: (line: string, error?: unknown) => void): ErrorRequestHandler {
  return (error: unknown, request, response, next) => {
    if (response.headersSent) {
      report(`${request.method} ${request.path} broke off`, error);
      next(error);
      return;
    }
    const known = error instanceof HttpProblem ? error : fromReader(error ?? {});
    if (known) {
      sendProblem(response, known);
      return;
    }
    const id = String(response.getHeader('x-request-id'));
    report(`${request.method} ${request.path} failed (${id})`, error);
    sendProblem(
      response,
      new HttpProblem(500, 'unexpected', 'The server failed at this.', {
        detail: `Nothing was changed. Try again; if it stays, quote ${id} to whoever runs the server.`,
      }),
    );
  };
}
