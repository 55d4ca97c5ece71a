import {type Response} from 'express';

/** A file that goes out. */
export interface Download {
  readonly fileName: string;
  readonly body: string | Buffer;
}

/** Sends a file as an attachment. */
export function sendDownload(res: Response, mediaType: string, {fileName, body}: Download): void {
  res.attachment(fileName); // also escapes the name
  res.type(mediaType).send(body);
}
