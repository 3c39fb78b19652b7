"""Read DXF files with ezdxf and list what is in them; anything wrong or repaired is an error."""
import sys

import ezdxf
from ezdxf.lldxf.encoding import decode_dxf_unicode


def reread(path):
    doc = ezdxf.readfile(path)
    audit = doc.audit()
    if audit.errors or audit.fixes:
        sys.exit("\n".join([path] + [str(e.message) for e in list(audit.errors) + list(audit.fixes)]))
    print("FILE", path)
    print(doc.dxfversion)
    for layer in doc.layers:
        print("LAYER", layer.dxf.name, layer.dxf.color, layer.dxf.linetype)
    for e in doc.modelspace():
        words = [e.dxftype(), e.dxf.layer]
        if not doc.layers.has_entry(e.dxf.layer):
            sys.exit(f"{path}: {words}: there is no such layer")
        if e.dxftype() == "POLYLINE":
            words.append(str(len(e.vertices)))
            words += [f"{v.dxf.location.x:g},{v.dxf.location.y:g}" for v in e.vertices]
        elif e.dxftype() == "ARC":
            words += [f"{e.dxf.start_angle:g}", f"{e.dxf.end_angle:g}"]
        elif e.dxftype() == "TEXT":
            words.append(decode_dxf_unicode(e.dxf.text))
        print(*words)


for name in sys.argv[1:]:
    reread(name)
