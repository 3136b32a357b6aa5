import { Button } from '@fluentui/react-components';
import { useState } from 'react';
import './copy-text.css';

/** Text to be copied as it stands: a key, an address, a command. */
export function CopyText({ text, label }: { text: string; label: string }) {
  const [copied, setCopied] = useState(false);
  const copy = () => {
    void navigator.clipboard.writeText(text).then(() => setCopied(true));
  };
  return (
    <div className="copy-text">
      {/* A scroll region must be reachable by keyboard. */}
      <pre tabIndex={0} aria-label={label}>
        {text}
      </pre>
      <Button size="small" onClick={copy} aria-label={`Copy ${label}`}>
        {copied ? 'Copied' : 'Copy'}
      </Button>
    </div>
  );
}
