#include "textflag.h"

// Four sites at a time of the kernels in kernel.go. A row is 512 bytes, a level
// 1024: the real parts of 64 sites, then the imaginary parts.

// func rateAVX2(k, g []float64, psiRe, psiIm *lane, factors []factor, left []float64)
TEXT ·rateAVX2(SB), NOSPLIT, $0-112
	MOVQ k_base+0(FP), DI
	MOVQ g_base+24(FP), SI
	MOVQ psiRe+48(FP), R8
	MOVQ psiIm+56(FP), R9
	MOVQ $16, CX                  // groups of four sites

rateSites:
	MOVQ    factors_base+64(FP), R10
	MOVQ    factors_len+72(FP), R11
	MOVQ    left_base+88(FP), BX
	MOVQ    DI, R12               // k of this level
	MOVQ    SI, R13               // g of this level
	VMOVUPD (R8), Y0              // psi
	VMOVUPD (R9), Y1
	VMOVUPD (R13), Y2             // f = g_n
	VMOVUPD 512(R13), Y3
	VXORPD  Y4, Y4, Y4            // rest
	VXORPD  Y5, Y5, Y5
	TESTQ   R11, R11
	JZ      rateLast

rateLevels:
	VBROADCASTSD (R10), Y6        // c
	VBROADCASTSD 8(R10), Y7
	VMULPD       Y6, Y0, Y8       // e = conj(psi) c
	VMULPD       Y7, Y1, Y9
	VADDPD       Y9, Y8, Y8
	VMULPD       Y7, Y0, Y9
	VMULPD       Y6, Y1, Y10
	VSUBPD       Y10, Y9, Y9
	VMOVUPD      1024(R13), Y10   // g_(n+1)
	VMOVUPD      1536(R13), Y11
	VMULPD       Y11, Y8, Y12     // k = rest + i e g_(n+1)
	VMULPD       Y10, Y9, Y13
	VADDPD       Y13, Y12, Y12
	VSUBPD       Y12, Y4, Y12
	VBROADCASTSD (BX), Y14        // minus i left f
	VMULPD       Y3, Y14, Y13
	VADDPD       Y13, Y12, Y12
	VMOVUPD      Y12, (R12)
	VMULPD       Y10, Y8, Y12
	VMULPD       Y11, Y9, Y13
	VSUBPD       Y13, Y12, Y12
	VADDPD       Y12, Y5, Y12
	VMULPD       Y2, Y14, Y13
	VSUBPD       Y13, Y12, Y12
	VMOVUPD      Y12, 512(R12)
	VMULPD       Y2, Y9, Y12      // rest = i conj(e) f
	VMULPD       Y3, Y8, Y13
	VSUBPD       Y13, Y12, Y4
	VMULPD       Y2, Y8, Y12
	VMULPD       Y3, Y9, Y13
	VADDPD       Y13, Y12, Y5
	VMOVAPD      Y10, Y2
	VMOVAPD      Y11, Y3
	ADDQ         $1024, R12
	ADDQ         $1024, R13
	ADDQ         $16, R10
	ADDQ         $8, BX
	DECQ         R11
	JNZ          rateLevels

rateLast:
	VBROADCASTSD (BX), Y14
	VMULPD       Y3, Y14, Y13
	VADDPD       Y13, Y4, Y4
	VMULPD       Y2, Y14, Y13
	VSUBPD       Y13, Y5, Y5
	VMOVUPD      Y4, (R12)
	VMOVUPD      Y5, 512(R12)
	ADDQ    $32, DI
	ADDQ    $32, SI
	ADDQ    $32, R8
	ADDQ    $32, R9
	DECQ    CX
	JNZ     rateSites
	VZEROUPPER
	RET

// func fieldAVX2(phiRe, phiIm *lane, g []float64, factors []factor)
TEXT ·fieldAVX2(SB), NOSPLIT, $0-64
	MOVQ phiRe+0(FP), R8
	MOVQ phiIm+8(FP), R9
	MOVQ g_base+16(FP), SI
	MOVQ $16, CX

fieldSites:
	MOVQ    factors_base+40(FP), R10
	MOVQ    factors_len+48(FP), R11
	MOVQ    SI, R13
	VMOVUPD (R13), Y2             // g_n
	VMOVUPD 512(R13), Y3
	VXORPD  Y4, Y4, Y4            // phi
	VXORPD  Y5, Y5, Y5
	TESTQ   R11, R11
	JZ      fieldLast

fieldLevels:
	VBROADCASTSD (R10), Y6        // c
	VBROADCASTSD 8(R10), Y7
	VMOVUPD      1024(R13), Y10   // g_(n+1)
	VMOVUPD      1536(R13), Y11
	VMULPD       Y10, Y2, Y8      // conj(g_n) g_(n+1)
	VMULPD       Y11, Y3, Y12
	VADDPD       Y12, Y8, Y8
	VMULPD       Y11, Y2, Y9
	VMULPD       Y10, Y3, Y12
	VSUBPD       Y12, Y9, Y9
	VMULPD       Y8, Y6, Y12      // times c
	VMULPD       Y9, Y7, Y13
	VSUBPD       Y13, Y12, Y12
	VADDPD       Y12, Y4, Y4
	VMULPD       Y9, Y6, Y12
	VMULPD       Y8, Y7, Y13
	VADDPD       Y13, Y12, Y12
	VADDPD       Y12, Y5, Y5
	VMOVAPD      Y10, Y2
	VMOVAPD      Y11, Y3
	ADDQ         $1024, R13
	ADDQ         $16, R10
	DECQ         R11
	JNZ          fieldLevels

fieldLast:
	VMOVUPD Y4, (R8)
	VMOVUPD Y5, (R9)
	ADDQ    $32, SI
	ADDQ    $32, R8
	ADDQ    $32, R9
	DECQ    CX
	JNZ     fieldSites
	VZEROUPPER
	RET

// func combineAVX2(dst, base []float64, c []float64, k [][]float64)
TEXT ·combineAVX2(SB), NOSPLIT, $0-96
	MOVQ dst_base+0(FP), DI
	MOVQ dst_len+8(FP), CX
	MOVQ base_base+24(FP), SI
	SHRQ $4, CX                   // sixteen numbers at a time
	JZ   combineDone
	XORQ BX, BX                   // bytes done

combineNumbers:
	MOVQ    c_base+48(FP), R8
	MOVQ    c_len+56(FP), R9
	MOVQ    k_base+72(FP), R10
	VMOVUPD (SI)(BX*1), Y0
	VMOVUPD 32(SI)(BX*1), Y1
	VMOVUPD 64(SI)(BX*1), Y2
	VMOVUPD 96(SI)(BX*1), Y3
	TESTQ   R9, R9
	JZ      combineStore

combineTerms:
	VBROADCASTSD (R8), Y4
	MOVQ         (R10), R11       // k[j]
	VMULPD       (R11)(BX*1), Y4, Y5
	VMULPD       32(R11)(BX*1), Y4, Y6
	VMULPD       64(R11)(BX*1), Y4, Y7
	VMULPD       96(R11)(BX*1), Y4, Y8
	VADDPD       Y5, Y0, Y0
	VADDPD       Y6, Y1, Y1
	VADDPD       Y7, Y2, Y2
	VADDPD       Y8, Y3, Y3
	ADDQ         $8, R8
	ADDQ         $24, R10
	DECQ         R9
	JNZ          combineTerms

combineStore:
	VMOVUPD Y0, (DI)(BX*1)
	VMOVUPD Y1, 32(DI)(BX*1)
	VMOVUPD Y2, 64(DI)(BX*1)
	VMOVUPD Y3, 96(DI)(BX*1)
	ADDQ    $128, BX
	DECQ    CX
	JNZ     combineNumbers

combineDone:
	VZEROUPPER
	RET
