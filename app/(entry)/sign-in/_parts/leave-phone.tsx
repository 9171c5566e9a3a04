"use client";

import { useEffect, useState } from "react";
import { Notice } from "@/components/ui/notice";
import { leavePhone } from "@/lib/offline/leave-phone";

/** After signing out, wherever that was: the day leaves this phone; what is not sent yet stays. */
export function LeavePhone() {
  const [kept, setKept] = useState(0);
  useEffect(() => {
    void leavePhone().then(setKept, () => undefined);
  }, []);
  if (kept === 0) return null;
  return (
    <Notice>
      {kept === 1 ? "One entry is" : `${kept} entries are`} kept safe on this phone and sent when
      the person who made {kept === 1 ? "it" : "them"} signs in here again.
    </Notice>
  );
}
