"""What sheets call our columns: common practice of the trade, in English and German, French where it differs."""

SYNONYMS: dict[str, tuple[str, ...]] = {
    "id": (
        "part number", "part no", "part nr", "article number", "article no", "article", "item number", "item no",
        "item",
        "order code", "order number", "order no", "ordering code", "sku", "model", "model number", "model name",
        "product", "product code", "product number", "product name", "type designation", "artikelnummer", "artikel nr",
        "art nr", "artikel", "bestellnummer", "bestell nr", "modell", "produkt", "bezeichnung", "reference", "name",
    ),
    "mount": (
        "lens mount", "camera mount", "mount type", "thread", "objektivanschluss", "anschluss", "gewinde", "fassung",
        "bajonett", "monture",
    ),
    "camera mount": (
        "camera side", "camera side mount", "camera side thread", "camera thread", "kameraseitig", "kameraanschluss",
    ),
    "travel": ("focus travel", "helicoid travel", "stroke", "adjustment range", "hub", "verstellweg", "course"),
    "maker": ("manufacturer", "brand", "vendor", "make", "supplier", "hersteller", "marke", "fabricant"),
    "kind": ("type", "lens type", "camera type", "lens kind", "typ", "bauart", "art", "objektivtyp", "kameratyp"),
    "focal length": ("focal length f", "focal", "efl", "effective focal length", "brennweite", "focale", "f"),
    "f-number min": (
        "min f number", "minimum f number", "f no", "f number", "f min", "min aperture number", "max aperture",
        "maximum aperture", "widest aperture", "lichtstärke", "blende min", "blendenzahl", "kleinste blendenzahl",
        "blende offen", "anfangsöffnung", "working f number", "f stop min",
    ),
    "f-number max": (
        "max f number", "maximum f number", "f max", "min aperture", "minimum aperture", "smallest aperture",
        "blende max", "größte blendenzahl", "kleinste blende", "f stop max",
    ),
    "nearest object": (
        "mod", "minimum object distance", "min object distance", "minimum working distance", "min working distance",
        "closest focus", "close focus", "near focus", "nearest focus", "minimum focus distance", "min focus distance",
        "nahgrenze", "naheinstellgrenze", "mindestabstand", "minimaler arbeitsabstand", "kleinster arbeitsabstand",
        "distance minimale",
    ),
    "magnification": ("mag", "primary magnification", "pmag", "abbildungsmaßstab", "vergrößerung", "grossissement"),
    "working distance": ("wd", "arbeitsabstand", "distance de travail"),
    "nearest magnification": (
        "max magnification", "maximum magnification", "magnification at mod", "max abbildungsmaßstab",
    ),
    "stops": ("f stops", "stop settings", "click stops", "blendenstufen", "rastblenden"),
    "image circle": (
        "image circle diameter", "image diameter", "max image circle", "image size", "bildkreis",
        "bildkreisdurchmesser", "max sensor diagonal", "cercle image",
    ),
    "distortion": ("max distortion", "tv distortion", "optical distortion", "verzeichnung", "verzeichnung max"),
    "detail limit": (
        "resolution", "resolving power", "optical resolution", "lens resolution", "auflösung", "auflösungsvermögen",
        "line pairs",
    ),
    "transmittance": ("transmission", "light transmission", "lichttransmission"),
    "pupil ratio": ("pupil magnification", "pupillenmaßstab", "pupillenverhältnis"),
    "front principal": ("front principal plane", "principal plane", "vordere hauptebene", "hauptebene"),
    "length": (
        "overall length", "total length", "lens length", "body length", "housing length", "depth", "länge",
        "baulänge", "gesamtlänge", "tiefe", "longueur", "thickness", "dicke", "ring length", "extension",
    ),
    "diameter": (
        "outer diameter", "max diameter", "lens diameter", "od", "durchmesser", "außendurchmesser", "diamètre",
    ),
    "mass": ("weight", "net weight", "gewicht", "masse", "nettogewicht", "poids"),
    "price": (
        "unit price", "list price", "net price", "price each", "price per piece", "price per unit", "cost", "preis",
        "listenpreis", "nettopreis", "einzelpreis", "stückpreis", "vk", "uvp", "prix",
    ),
    "stock": (
        "in stock", "on stock", "quantity in stock", "stock quantity", "qty in stock", "available", "availability",
        "inventory", "qty", "quantity", "on hand", "bestand", "lager", "lagerbestand", "verfügbar", "auf lager",
        "menge",
    ),
    "focal tolerance": ("focal length tolerance", "tolerance of focal length", "brennweitentoleranz"),
    "flange distance": (
        "flange focal distance", "flange focal length", "flange back", "flange back distance", "ffd", "auflagemaß",
        "tirage mécanique",
    ),
    "working distance tolerance": ("wd tolerance", "tolerance of working distance", "arbeitsabstandstoleranz"),
    "telecentricity": ("max telecentricity", "telecentricity error", "telezentrie", "telezentriefehler"),
    "pixels wide": (
        "horizontal pixels", "pixels h", "h pixels", "resolution h", "horizontal resolution", "resolution horizontal",
        "columns", "image width", "sensor width px", "width px", "pixel horizontal", "auflösung horizontal",
        "pixel h", "breite px", "active pixels h", "row length", "resolution x",
    ),
    "pixels high": (
        "vertical pixels", "pixels v", "v pixels", "resolution v", "vertical resolution", "resolution vertical",
        "rows", "image height", "sensor height px", "height px", "pixel vertikal", "auflösung vertikal", "pixel v",
        "höhe px", "active pixels v", "resolution y",
    ),
    "pixel pitch": (
        "pixel size", "pitch", "cell size", "pixel size h", "pixelgröße", "pixelabstand", "pixelmaß", "taille de pixel",
    ),
    "colour": (
        "color", "mono color", "mono colour", "color mono", "colour mono", "chroma", "sensor color", "spectrum",
        "sensor type", "sensor",
        "farbe", "mono farbe", "farbe mono", "couleur",
    ),
    "shutter": ("shutter type", "sensor type", "sensor", "sensor shutter", "verschluss", "verschlussart", "obturateur"),
    "interface": ("data interface", "camera interface", "bus", "schnittstelle", "datenschnittstelle"),
    "cable limit": (
        "max cable length", "maximum cable length", "cable length", "max cable", "kabellänge", "max kabellänge",
    ),
    "frame rate": (
        "max frame rate", "fps", "frames per second", "frame rate max", "bildrate", "bildfrequenz", "max bildrate",
    ),
    "line rate": ("max line rate", "line frequency", "zeilenrate", "zeilenfrequenz", "max zeilenrate"),
    "bit depth": ("adc bits", "adc resolution", "adc", "bits", "bits per pixel", "pixel depth", "bittiefe"),
    "shortest exposure": (
        "min exposure", "minimum exposure", "min exposure time", "minimum exposure time", "shortest exposure time",
        "exposure min", "kürzeste belichtung", "min belichtungszeit", "kürzeste belichtungszeit",
    ),
    "quantum efficiency": ("qe", "peak qe", "max qe", "quanteneffizienz", "quantenausbeute"),
    "dark noise": ("temporal dark noise", "read noise", "readout noise", "dunkelrauschen", "ausleserauschen"),
    "saturation capacity": ("full well", "full well capacity", "well depth", "fwc", "sättigungskapazität"),
    "power": ("power consumption", "power draw", "leistung", "leistungsaufnahme", "consommation"),
    "quantity": ("qty", "pieces", "count", "number", "stock", "in stock", "anzahl", "stück", "menge", "bestand"),
}  # fmt: skip
"""By column of ours."""

PAIRS: dict[tuple[str, str], tuple[str, ...]] = {
    ("pixels wide", "pixels high"): (
        "resolution", "sensor resolution", "pixels", "active pixels", "image size", "resolution h x v", "h x v",
        "number of pixels", "auflösung", "pixelzahl", "sensorauflösung", "resolution pixels",
    ),
    ("f-number min", "f-number max"): (
        "aperture", "aperture range", "f number", "f number range", "f no", "iris", "iris range", "f stop",
        "f stop range",
        "f stops", "stop range", "blende", "blendenbereich", "blendenzahl", "f number min max", "ouverture",
    ),
}  # fmt: skip
"""Two of our columns in one of theirs, as "2448 x 2048"."""

USUAL_UNITS: dict[str, str] = {
    "pixel pitch": "µm",
    "cable limit": "m",
    "shortest exposure": "µs",
    "telecentricity": "deg",
    "line rate": "kHz",
}  # fmt: skip
"""Units that the trade states a column in, where they are not the core's; common practice."""

WORDS: dict[str, tuple[str, ...]] = {
    "telecentric": ("telecentric", "telezentrisch", "tele", "télécentrique"),
    "entocentric": (
        "entocentric", "entozentrisch", "fixed focal", "fixed focal length", "ffl", "festbrennweite", "standard",
        "macro",
        "conventional",
    ),
    "mono": ("mono", "monochrome", "monochrom", "black white", "b w", "m", "grey", "gray", "sw", "schwarz weiß"),
    "colour": ("colour", "color", "farbe", "farb", "rgb", "bayer", "c", "col", "couleur"),
    "global": ("global", "global shutter", "gs", "yes global"),
    "rolling": ("rolling", "rolling shutter", "rs", "global reset"),
    "area": ("area", "area scan", "matrix", "flächenkamera", "fläche", "matrixkamera"),
    "line": ("line", "line scan", "linescan", "zeile", "zeilenkamera"),
}  # fmt: skip
"""What sheets write for our words."""
