import { installPeers } from "./installPeers.mjs";
import { measurePeer } from "./measurePeer.mjs";
import { single } from "./rows.mjs";

/** Two general-purpose servers on documents of the same length with as many findings. */
export async function peerRows({ aimed, smoke, peers: wanted }) {
  const heading = {
    measure: `Peers, ${aimed.toLocaleString("en-US")} lines, an edit and its diagnostics alone`,
  };
  if (!wanted) return [heading, { measure: "left out", value: "as asked" }];
  const { peers, why } = installPeers({ mayInstall: !smoke });
  if (why) return [heading, { measure: "left out", value: why }];
  const rows = [heading];
  for (const peer of peers) {
    try {
      const { ms, found, how } = await measurePeer(peer, aimed, smoke ? 2 : 5);
      rows.push(single(`${peer.name}, ${found} findings ${how}`, ms));
    } catch (error) {
      rows.push({ measure: peer.name, value: `not measured: ${error.message.slice(0, 120)}` });
    }
  }
  return rows;
}
