import {
  FormDataParseError,
  MaxFileSizeExceededError,
  MaxFilesExceededError,
  MaxHeaderSizeExceededError,
  MaxPartsExceededError,
  MaxTotalSizeExceededError,
  parseFormData,
} from "@remix-run/form-data-parser";
import { BadRequest, Invalid, TooLarge, UnsupportedMedia } from "#app/http/errors.ts";
import { SHEET_LIMITS, tooManyBytes } from "./decode.ts";
import type { UploadedSheet } from "./receiveSheet.server.ts";

/** Beside the file the form holds next to nothing. */
const OVERHEAD = 64 * 1024;

/**
 * Reads the file of an upload form. The limit is held while the body streams in: what goes beyond it is not read.
 * @throws UnsupportedMedia when the body is not a form with a file; TooLarge beyond 10 MB; BadRequest when it is broken;
 *   Invalid when no file was chosen
 */
export async function readUpload(request: Request): Promise<UploadedSheet> {
  const type = (request.headers.get("Content-Type") ?? "").split(";", 1)[0]?.trim().toLowerCase();
  if (type !== "multipart/form-data") {
    throw new UnsupportedMedia("A sheet is sent as a file. Choose it on the page and send it from there.");
  }
  if (Number(request.headers.get("Content-Length") ?? 0) > SHEET_LIMITS.bytes + OVERHEAD)
    throw new TooLarge(tooManyBytes());
  const files: UploadedSheet[] = [];
  try {
    await parseFormData(
      request,
      { maxFileSize: SHEET_LIMITS.bytes, maxFiles: 1, maxParts: 10, maxTotalSize: SHEET_LIMITS.bytes + OVERHEAD },
      async (file) => {
        if (file.fieldName === "sheet" && file.name !== "") {
          files.push({ name: unescapedName(file.name), bytes: new Uint8Array(await file.arrayBuffer()) });
        }
      },
    );
  } catch (error) {
    if (error instanceof MaxFileSizeExceededError || error instanceof MaxTotalSizeExceededError) {
      throw new TooLarge(tooManyBytes());
    }
    if (error instanceof MaxFilesExceededError || error instanceof MaxPartsExceededError) {
      throw new BadRequest("Send one sheet at a time.");
    }
    if (error instanceof FormDataParseError || error instanceof MaxHeaderSizeExceededError) {
      throw new BadRequest("The upload arrived broken off or damaged, so nothing was kept. Send the sheet again.");
    }
    throw error;
  }
  const [sheet] = files;
  if (!sheet) {
    const sentence = "No file was chosen. Choose the sheet, then send it.";
    throw new Invalid(sentence, [{ pointer: "/sheet", detail: sentence }]);
  }
  return sheet;
}

/** Browsers write a quotation mark in a file's name as %22 and line ends as %0D and %0A (HTML, multipart/form-data). */
function unescapedName(name: string): string {
  return name.replace(/%(?:22|0D|0A)/g, (escape) => decodeURIComponent(escape));
}
