import { BodyTooLarge, InvalidInput } from '../errors';

/**
 * The form of a page that takes a file, with a limit to how much is read. Throws `BodyTooLarge` or `InvalidInput`.
 */
export async function readForm(request: Request, maxBytes: number): Promise<FormData> {
  const tooLarge = new BodyTooLarge(
    `That is more than ${Math.floor(maxBytes / 1000)} kB, the most that is read here. Nothing was changed.`,
  );
  if (Number(request.headers.get('content-length') ?? 0) > maxBytes) throw tooLarge;
  const chunks: Uint8Array[] = [];
  let size = 0;
  if (request.body) {
    for await (const chunk of request.body as unknown as AsyncIterable<Uint8Array>) {
      size += chunk.byteLength;
      if (size > maxBytes) throw tooLarge;
      chunks.push(chunk);
    }
  }
  const type = request.headers.get('content-type') ?? '';
  try {
    return await new Response(Buffer.concat(chunks), {
      headers: { 'content-type': type },
    }).formData();
  } catch {
    throw new InvalidInput('The form could not be read. Nothing was changed.');
  }
}

/** The text of a form's file, else of its text field. Throws `InvalidInput` for a file that is no text. */
export async function textOfForm(form: FormData, file: string, field: string): Promise<string> {
  const upload = form.get(file);
  if (upload instanceof Blob && upload.size > 0) {
    try {
      return new TextDecoder('utf-8', { fatal: true }).decode(await upload.arrayBuffer());
    } catch {
      throw new InvalidInput('The file is not text in UTF-8. Save it as “CSV UTF-8”.');
    }
  }
  const typed = form.get(field);
  return typeof typed === 'string' ? typed : '';
}
