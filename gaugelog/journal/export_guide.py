"""The text that goes with an exported journal: how to check it with two ordinary programs."""

from __future__ import annotations

from collections.abc import Sequence

_GUIDE = """\
THE JOURNAL OF A LOGBOOK, WRITTEN OUT
=====================================

Every entry of the journal is here as the exact bytes that were hashed and
signed. You can check them without the program that wrote them. You need a
shell with openssl and sha256sum. Run each indented block in this folder; it
prints one line for each thing that is wrong, and nothing when all is well.

What is here
------------

  chain-ID/000012.header.json  the header of entry 12: who, when, what kind
  chain-ID/000012.body.json    its body: the fact itself
  chain-ID/000012.sig          its signature, on the last entry of each deed
  certificates/                the certificate and public key of each signer,
                               named by the SHA-256 of the certificate
  authority.pem                the authority that issued the certificates
  evidence/                    files, each named by the SHA-256 of its bytes

@LEFT_OUT@Names of people are not here: entries hold their ids only.

1. Each body is the one that its header names
---------------------------------------------

    for body in chain-*/*.body.json; do
      header="${body%.body.json}.header.json"
      sum=$(sha256sum < "$body" | cut -d ' ' -f 1)
      grep -q "\\"body\\":\\"$sum\\"" "$header" || echo "$body is not the body of $header"
    done

2. Each header names the one before it; the first names 64 zeros
----------------------------------------------------------------

    for chain in chain-*; do
      sum=$(printf '%064d' 0); number=1
      for header in "$chain"/*.header.json; do
        grep -q "\\"previous\\":\\"$sum\\"" "$header" || echo "$header does not follow"
        grep -q "\\"seq\\":$number," "$header" || echo "$header is not number $number"
        sum=$(sha256sum < "$header" | cut -d ' ' -f 1); number=$((number + 1))
      done
    done

3. The last entry of each deed is signed by the key that it names
-----------------------------------------------------------------

    for header in chain-*/*.header.json; do
      count=$(grep -o '"count":[0-9]*' "$header" | cut -d : -f 2)
      index=$(grep -o '"index":[0-9]*' "$header" | cut -d : -f 2)
      [ "$index" = "$count" ] || continue
      key=$(grep -o '"certificate":"[0-9a-f]*"' "$header" | cut -d '"' -f 4)
      openssl dgst -sha256 -verify "certificates/$key.pub.pem" \\
        -signature "${header%.header.json}.sig" "$header" > /dev/null 2>&1 ||
        echo "$header is not signed by $key"
    done

4. Each key is that of a certificate which the authority issued
---------------------------------------------------------------

    for certificate in certificates/*.pem; do
      case "$certificate" in *.pub.pem) continue ;; esac
      own=$(openssl x509 -in "$certificate" -outform DER | sha256sum | cut -d ' ' -f 1)
      [ "$certificate" = "certificates/$own.pem" ] || echo "$certificate has another name"
      openssl x509 -in "$certificate" -noout -pubkey | cmp -s - "certificates/$own.pub.pem" ||
        echo "$certificate has another key"
      openssl verify -no_check_time -partial_chain -CAfile authority.pem "$certificate" \\
        > /dev/null 2>&1 || echo "$certificate was not issued by the authority"
    done

The time of each entry is in its header; the certificate must have been in
force then, and not revoked by an earlier entry of kind certificate.revoked.
To see whose a certificate is and when it is in force:

  $ openssl x509 -in certificates/NAME.pem -noout -subject -dates

5. Each evidence file has the bytes that its name says
------------------------------------------------------

    for file in evidence/*; do
      [ -e "$file" ] || continue
      sum=$(sha256sum < "$file" | cut -d ' ' -f 1)
      [ "$file" = "evidence/$sum" ] || echo "$file was altered"
    done

6. Nothing was cut off at the end
---------------------------------

@HEADS@

Compare with the head printed on your latest record: its number must be here,
and its letters must be these, made from the header of that entry:

  $ openssl dgst -sha256 -binary chain-ID/NUMBER.header.json |
      head -c 16 | base32 | tr -d =

What this proves and what it does not
-------------------------------------

An alteration by anyone without the signers' keys shows. Someone who holds all
the keys could have written everything anew after the last head that is kept
elsewhere. The authority's certificate tells that one authority issued all
certificates; who it is, you know when you have confirmed its fingerprint:

  $ openssl x509 -in authority.pem -noout -fingerprint -sha256
"""


_LEFT_OUT = """\
Left out of the evidence on purpose: originals of photos (@COUNT@), which may
tell where and with what they were taken. Their digests are in the entries; the
records show smaller copies. Who keeps the logbook has the originals.

"""


def guide(heads: Sequence[tuple[str, str]], left_out: int = 0) -> str:
    """The guide, with the head of each chain (its id and the head as printed).

    `left_out` is how many evidence files are not there on purpose.
    """
    lines = [f"The head of chain-{chain} at the time of export:\n  {head}" for chain, head in heads]
    told = _LEFT_OUT.replace("@COUNT@", str(left_out)) if left_out else ""
    text = _GUIDE.replace("@LEFT_OUT@", told)
    return text.replace("@HEADS@", "\n".join(lines) or "The journal holds no entry.")
