"""Keys and certificates made for a test and gone after it."""

from __future__ import annotations

import datetime
from pathlib import Path

from cryptography import x509
from cryptography.hazmat.primitives import hashes
from cryptography.hazmat.primitives.asymmetric import ec
from cryptography.hazmat.primitives.serialization import (
    BestAvailableEncryption,
    Encoding,
    pkcs12,
)
from cryptography.x509.oid import NameOID

PASSPHRASE = "a phrase of the test"  # noqa: S105 - locks a key that lives for one test


def write_key(folder: Path, name: str, serial: int) -> tuple[Path, Path]:
    """Write a PKCS#12 file and the certificate that it holds, self-signed.

    Parameters
    ----------
    folder
        Where to write.
    name
        Common name of the certificate.
    serial
        Its serial number.

    Returns
    -------
    tuple of Path
        Key file and certificate.
    """
    key = ec.generate_private_key(ec.SECP256R1())
    subject = x509.Name([x509.NameAttribute(NameOID.COMMON_NAME, name)])
    now = datetime.datetime.now(datetime.UTC)
    certificate = (
        x509.CertificateBuilder()
        .subject_name(subject)
        .issuer_name(subject)
        .public_key(key.public_key())
        .serial_number(serial)
        .not_valid_before(now - datetime.timedelta(days=1))
        .not_valid_after(now + datetime.timedelta(days=30))
        .add_extension(
            x509.KeyUsage(
                digital_signature=True,
                content_commitment=True,
                key_encipherment=False,
                data_encipherment=False,
                key_agreement=False,
                key_cert_sign=False,
                crl_sign=False,
                encipher_only=False,
                decipher_only=False,
            ),
            critical=True,
        )
        .sign(key, hashes.SHA256())
    )
    lock = BestAvailableEncryption(PASSPHRASE.encode())
    packed = pkcs12.serialize_key_and_certificates(b"test", key, certificate, None, lock)
    file, shown = folder / f"{serial}.p12", folder / f"{serial}.pem"
    file.write_bytes(packed)
    shown.write_bytes(certificate.public_bytes(Encoding.PEM))
    return file, shown
