[Version] 2.0
! 2-port network, S-parameter and noise data
# GHz S MA
[Number of Ports] 2
[Two-Port Data Order] 21_12
[Number of Frequencies] 2
[Number of Noise Frequencies] 2
[Reference] 50 25.0
[Network Data]
! NETWORK PARAMETERS
2 .95 -26 3.57 157 .04 76 .66 -14
22 .60 -144 1.30 40 .14 40 .56 -85
[Noise Data]
! NOISE PARAMETERS
4 .7 .64 69 19
18 2.7 .46 -33 20
[End]
