import {
  DeleteObjectCommand, GetObjectCommand, HeadObjectCommand, PutObjectCommand, S3Client, S3ServiceException,
} from '@aws-sdk/client-s3';
import { Readable } from 'node:stream';
import { buffer } from 'node:stream/consumers';
import type { StorageSettings } from '@/lib/env';
import { checkKey, FileMissing, type Storage } from './storage';

function isMissing(error: unknown): boolean {
  return error instanceof S3ServiceException && error.$metadata.httpStatusCode === 404;
}

/**
 * Files in a bucket that speaks the S3 protocol. A stream is read into memory first: the protocol asks for the length
 * beforehand, and our files are documents and extracts of a few megabytes, checked for size before they come here.
 */
export function s3Storage(settings: Extract<StorageSettings, { kind: 's3' }>): Storage {
  const { endpoint, region, bucket: Bucket, accessKeyId, secretAccessKey } = settings;
  const client = new S3Client({
    endpoint,
    region,
    credentials: { accessKeyId, secretAccessKey },
    forcePathStyle: true,
    // Otherwise bodies are sent in checksummed chunks that many stores keep as they come.
    requestChecksumCalculation: 'WHEN_REQUIRED',
    responseChecksumValidation: 'WHEN_REQUIRED',
  });

  return {
    async put(key, body, { contentType }) {
      const content = Buffer.isBuffer(body) ? body : await buffer(body);
      await client.send(
        new PutObjectCommand({ Bucket, Key: checkKey(key), Body: content, ContentType: contentType, ContentLength: content.length }),
      );
      return { sizeBytes: content.length, contentType };
    },
    async get(key) {
      try {
        const { Body } = await client.send(new GetObjectCommand({ Bucket, Key: checkKey(key) }));
        if (!(Body instanceof Readable)) throw new Error('The file store answered without a body.');
        return Body;
      } catch (error) {
        throw isMissing(error) ? new FileMissing() : error;
      }
    },
    async head(key) {
      try {
        const { ContentLength, ContentType } = await client.send(new HeadObjectCommand({ Bucket, Key: checkKey(key) }));
        return { sizeBytes: ContentLength ?? 0, contentType: ContentType ?? 'application/octet-stream' };
      } catch (error) {
        if (isMissing(error)) return null;
        throw error;
      }
    },
    async remove(key) {
      await client.send(new DeleteObjectCommand({ Bucket, Key: checkKey(key) }));
    },
  };
}
