"""Who computed: name and version of the computation and of the libraries under it."""

import numpy
import scipy

ENGINE = {
    "name": "assessment",
    "version": "0.1.0",
    "numpy": numpy.__version__,
    "scipy": scipy.__version__,
}
