import {HttpClient} from '@angular/common/http';
import {inject, Injectable} from '@angular/core';
import {firstValueFrom} from 'rxjs';
import type * as z from 'zod';
import {type JsonEndpoint} from '#shared/endpoint';
import {ApiFailure, toApiFailure} from './api-failure';

interface Sent {
  readonly params?: Readonly<Record<string, string>>;
  readonly query?: Readonly<Record<string, string | number | undefined>>;
  readonly body?: unknown;
}

/** Makes the calls that shared/ describes: fills the path, parses the reply, throws ApiFailure. */
@Injectable({providedIn: 'root'})
export class ApiCaller {
  private readonly http = inject(HttpClient);

  async call<I extends z.ZodType, R extends z.ZodType>(
    endpoint: JsonEndpoint<I, R>,
    input: z.input<I>,
  ): Promise<z.output<R>> {
    const {params = {}, query = {}, body} = input as Sent;
    let reply: unknown;
    try {
      reply = await firstValueFrom(
        this.http.request(endpoint.method, urlOf(endpoint.path, params), {
          body,
          params: given(query),
          withCredentials: true,
          headers: {'ngsw-bypass': ''}, // the service worker must not answer for the server
        }),
      );
    } catch (error) {
      throw toApiFailure(error); // HttpErrorResponse: refused, or no answer
    }

    const parsed = endpoint.reply.safeParse(reply);
    if (parsed.success) return parsed.data;
    throw new ApiFailure('unreadable', `The answer to ${endpoint.path} is not as described.`);
  }
}

/** Address of a described path, with its parameters filled in. */
export function urlOf(path: string, params: Readonly<Record<string, string>> = {}): string {
  return `/api${path.replace(/:(\w+)/g, (_, name: string) => encodeURIComponent(params[name] ?? ''))}`;
}

function given(query: NonNullable<Sent['query']>): Record<string, string | number> {
  return Object.fromEntries(
    Object.entries(query).filter(
      (pair): pair is [string, string | number] => pair[1] !== undefined,
    ),
  );
}
