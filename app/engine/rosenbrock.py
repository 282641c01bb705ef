"""Coefficients of the Rosenbrock method that marches the network: six stages, order 4 with 3 embedded.

L-stable and stiffly accurate, in the form that needs no product with the Jacobian: with
``W = I/(GAMMA h) - J`` stage i solves
``W k_i = f(t + ALPHA_i h, y + sum A_ij k_j) + sum C_ij k_j / h + PUSH_i h df/dt``;
the result is ``y + sum A_6j k_j + k_6`` and ``k_6`` is the error estimate. In between
``y(s) = (1 - s) y0 + s (y1 + (1 - s) (sum THIRD_j k_j + s sum FOURTH_j k_j))``.

Source: E. Hairer, G. Wanner, Solving Ordinary Differential Equations II, 2nd ed. (1996), section IV.10, the
method RODAS and its continuous extension (from memory; the order it reaches is measured in the tests).
"""

import numpy as np

STAGES = 6
GAMMA = 0.25
ALPHA = np.array([0.0, 0.386, 0.21, 0.63, 1.0, 1.0])
PUSH = np.array([0.25, -0.1043, 0.1035, -0.03620000000000023, 0.0, 0.0])
A = np.array(
    [
        [0.0, 0.0, 0.0, 0.0, 0.0],
        [1.544, 0.0, 0.0, 0.0, 0.0],
        [0.9466785280815826, 0.2557011698983284, 0.0, 0.0, 0.0],
        [3.314825187068521, 2.896124015972201, 0.9986419139977817, 0.0, 0.0],
        [1.221224509226641, 6.019134481288629, 12.53708332932087, -0.6878860361058950, 0.0],
        [1.221224509226641, 6.019134481288629, 12.53708332932087, -0.6878860361058950, 1.0],
    ]
)
C = np.array(
    [
        [0.0, 0.0, 0.0, 0.0, 0.0],
        [-5.6688, 0.0, 0.0, 0.0, 0.0],
        [-2.430093356833875, -0.2063599157091915, 0.0, 0.0, 0.0],
        [-0.1073529058151375, -9.594562251023355, -20.47028614809616, 0.0, 0.0],
        [7.496443313967647, -10.24680431464352, -33.99990352819905, 11.70890893206160, 0.0],
        [8.083246795921522, -7.981132988064893, -31.52159432874371, 16.31930543123136, -6.058818238834054],
    ]
)
THIRD = np.array([10.12623508344586, -7.487995877610167, -34.80091861555747, -7.992771707568823, 1.025137723295662])
FOURTH = np.array([-0.6762803392806898, 6.087714651680015, 16.43084320892478, 24.76722511418386, -6.594389125716872])
