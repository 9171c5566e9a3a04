import {
  GetObjectCommand,
  NoSuchKey,
  PutObjectCommand,
  S3Client,
  S3ServiceException,
} from "@aws-sdk/client-s3";
import type { Env } from "@/lib/env";
import { AppError } from "@/lib/errors";
import type { ObjectStorage } from "@/lib/usecases/use-case";

type Settings = Pick<
  Env,
  "S3_BUCKET" | "S3_ENDPOINT" | "S3_REGION" | "S3_ACCESS_KEY_ID" | "S3_SECRET_ACCESS_KEY"
>;

/** A call that hangs would hold a phone, and the transaction behind it. */
const PATIENCE_MS = 15_000;

/** Objects in a bucket that speaks S3, at S3_ENDPOINT where one is given. */
export function objectStorage(settings: Settings): ObjectStorage {
  const Bucket = settings.S3_BUCKET;
  if (!Bucket) return NOWHERE;
  const client = clientFor(settings);
  const abortSignal = () => AbortSignal.timeout(PATIENCE_MS);
  return {
    async put(Key, bytes, ContentType) {
      const command = new PutObjectCommand({ Bucket, Key, Body: bytes, ContentType });
      await client.send(command, { abortSignal: abortSignal() }).catch(unavailable);
    },
    async get(Key) {
      try {
        const command = new GetObjectCommand({ Bucket, Key });
        const found = await client.send(command, { abortSignal: abortSignal() });
        if (!found.Body) return null;
        return { body: found.Body.transformToWebStream(), bytes: found.ContentLength ?? 0 };
      } catch (error) {
        return error instanceof NoSuchKey ? null : unavailable(error);
      }
    },
  };
}

function clientFor(settings: Settings): S3Client {
  const { S3_ENDPOINT, S3_REGION, S3_ACCESS_KEY_ID, S3_SECRET_ACCESS_KEY } = settings;
  return new S3Client({
    region: S3_REGION,
    maxAttempts: 2,
    // A bucket's name in the path works at every address; as a host name only where DNS knows it.
    ...(S3_ENDPOINT && { endpoint: S3_ENDPOINT, forcePathStyle: true }),
    ...(S3_ACCESS_KEY_ID &&
      S3_SECRET_ACCESS_KEY && {
        credentials: { accessKeyId: S3_ACCESS_KEY_ID, secretAccessKey: S3_SECRET_ACCESS_KEY },
      }),
  });
}

/** @throws AppError unavailable, always; the provider's own words go to the log with it */
function unavailable(error: unknown): never {
  const why = error instanceof S3ServiceException ? error.name : "no answer";
  const trouble = new AppError("unavailable", `Photos cannot be stored or shown now (${why}).`);
  trouble.cause = error;
  throw trouble;
}

const NOT_SET = "Photos have no place yet: the office must set S3_BUCKET first.";
const refuse = async () => {
  throw new AppError("unavailable", NOT_SET);
};
const NOWHERE: ObjectStorage = { put: refuse, get: refuse };
