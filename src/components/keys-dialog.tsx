import { text } from '../../shared/text.js';
import { Dialog } from './dialog.js';

export function KeysDialog({ onClose }: { onClose: () => void }) {
  return (
    <Dialog title={text.common.keysTitle} onClose={onClose}>
      <table className="w-full text-start">
        <tbody>
          {text.common.keysGeneral.map(([keys, does]) => (
            <tr key={keys} className="border-b border-line align-top last:border-0">
              <th scope="row" className="py-2 pe-4 text-start font-num font-normal">
                {keys}
              </th>
              <td className="py-2">{does}</td>
            </tr>
          ))}
        </tbody>
      </table>
    </Dialog>
  );
}
