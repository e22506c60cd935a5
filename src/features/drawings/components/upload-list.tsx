import { Link } from 'react-router-dom';
import { Button } from '#client/components/button.tsx';
import { RequestNumber } from '#client/components/problem-note.tsx';
import { ProgressBar } from '#client/components/progress-bar.tsx';
import { paths } from '#client/lib/paths.ts';
import { byteText, drawingsText as text } from '#client/text/drawings.ts';
import { isOnItsWay, type Upload } from '../upload/upload-queue.ts';
import { uploadQueue } from '../upload/use-uploads.ts';

/** One line for each file on its way: how far it is, and what to do when it did not arrive. */
export function UploadList({ uploads }: { uploads: readonly Upload[] }) {
  if (uploads.length === 0) return null;
  return (
    <section aria-label={text.uploads} className="border-b border-ink px-3.5 py-2">
      <ul className="m-0 list-none p-0">
        {uploads.map((upload) => (
          <li
            key={upload.id}
            className="flex flex-wrap items-start gap-x-3 gap-y-1 border-b border-rule-2 py-2 last:border-b-0"
          >
            <div className="min-w-0 flex-1 basis-[13.75rem]">
              <p className="m-0 font-semibold break-words">{upload.file.name}</p>
              <UploadProgress upload={upload} />
            </div>
            <UploadActions upload={upload} />
          </li>
        ))}
      </ul>
    </section>
  );
}

function UploadProgress({ upload }: { upload: Upload }) {
  const { progress, file } = upload;
  if (progress.state === 'waiting') return <p className="m-0 text-ink-2">{text.uploadWaiting}</p>;
  if (progress.state === 'added')
    return (
      <p role="status" className="m-0 text-good">
        {text.uploadDone}
      </p>
    );
  if (progress.state === 'same')
    return (
      <p role="alert" className="m-0">
        <span className="text-attention">{progress.message}</span>{' '}
        <Link to={paths.drawing(progress.drawingId)}>{text.openIt}</Link>
      </p>
    );
  if (progress.state === 'failed')
    return (
      <div role="alert">
        <p className="m-0 text-wrong">{progress.message}</p>
        <RequestNumber error={progress.error} />
      </div>
    );
  return (
    <>
      <p className="m-0 mb-1 text-ink-2">
        {progress.share < 1
          ? text.uploadSending(byteText(Math.round(progress.share * file.size)), byteText(file.size))
          : text.uploadChecking}
      </p>
      <ProgressBar label={text.uploadProgress(file.name)} value={progress.share} />
    </>
  );
}

function UploadActions({ upload }: { upload: Upload }) {
  const { progress, file, id } = upload;
  return (
    <div className="flex flex-wrap gap-2">
      {progress.state === 'same' ? (
        <Button look="quiet" onClick={() => uploadQueue.keepSecond(id)}>
          {text.keepSecond}
        </Button>
      ) : null}
      {progress.state === 'failed' && progress.canRetry ? (
        <Button look="quiet" aria-label={text.tryAgainWith(file.name)} onClick={() => uploadQueue.retry(id)}>
          {text.tryAgain}
        </Button>
      ) : null}
      <Button
        look="quiet"
        aria-label={isOnItsWay(upload) ? text.cancelUpload(file.name) : text.dismissUpload(file.name)}
        onClick={() => uploadQueue.remove(id)}
      >
        {isOnItsWay(upload) ? text.cancel : text.dismiss}
      </Button>
    </div>
  );
}
